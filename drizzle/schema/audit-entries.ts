import { integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';

/** Who changed people, keys, rovers or settings, and how. Rows are only ever added. */
export const auditEntries = sqliteTable('audit_entries', {
  id: integer('id').primaryKey({ autoIncrement: true }),
  at: instant('at').notNull(),
  /** Null: the system itself, or a person not signed in (setting a password by link). */
  actorUserId: integer('actor_user_id'),
  actorName: text('actor_name').notNull(),
  action: text('action').notNull(),
  subject: text('subject').notNull(),
  before: text('before', { mode: 'json' }).$type<Record<string, unknown>>(),
  after: text('after', { mode: 'json' }).$type<Record<string, unknown>>(),
});
