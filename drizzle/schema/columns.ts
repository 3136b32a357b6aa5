import { integer } from 'drizzle-orm/sqlite-core';

/** An instant: integer milliseconds UTC, everywhere. */
export const instant = (name: string) => integer(name);
export const flag = (name: string) => integer(name, { mode: 'boolean' });
