import { integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';
import { users } from './users.js';

/** One-time links by which a password is set: invitation, reset, or the very first manager (no user yet). */
export const passwordLinks = sqliteTable('password_links', {
  tokenHash: text('token_hash').primaryKey(),
  purpose: text('purpose', { enum: ['invite', 'reset', 'firstManager'] }).notNull(),
  userId: integer('user_id').references(() => users.id, { onDelete: 'cascade' }),
  createdAt: instant('created_at').notNull(),
  expiresAt: instant('expires_at').notNull(),
  usedAt: instant('used_at'),
});
