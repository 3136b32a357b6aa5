import { integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';

/** A read-only board for a screen on the wall. */
export const displayLinks = sqliteTable('display_links', {
  id: integer('id').primaryKey({ autoIncrement: true }),
  name: text('name').notNull(),
  tokenHash: text('token_hash').notNull().unique(),
  createdAt: instant('created_at').notNull(),
  lastOpenedAt: instant('last_opened_at'),
  revokedAt: instant('revoked_at'),
});
