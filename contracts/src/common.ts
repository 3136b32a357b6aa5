import { z } from 'zod';

export const id = z.number().int().positive();
/** Path parameters arrive as text. */
export const idParam = z.coerce.number().int().positive();
/** An instant as integer milliseconds UTC. Used inside, and on the board where every byte is sent once a second. */
export const instantMs = z.number().int();
/** An instant as ISO 8601 UTC text, for outside clients. */
export const instantText = z.iso.datetime({ offset: true });
export const shortText = (what: string, max = 80) =>
  z.string().trim().min(1, `Write ${what}`).max(max, `At most ${max} characters`);
export const optionalText = (max = 400) => z.string().trim().max(max, `At most ${max} characters`).nullable();
export const latitude = z.number().min(-90, 'Between -90 and 90').max(90, 'Between -90 and 90');
export const longitude = z.number().min(-180, 'Between -180 and 180').max(180, 'Between -180 and 180');
