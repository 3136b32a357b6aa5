import { integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { flag, instant } from './columns.js';
import { crews } from './crews.js';

export const users = sqliteTable('users', {
  id: integer('id').primaryKey({ autoIncrement: true }),
  name: text('name').notNull(),
  email: text('email').notNull().unique(),
  /** argon2id in PHC form; null until the invitation is accepted. */
  passwordHash: text('password_hash'),
  role: text('role', { enum: ['manager', 'dispatcher', 'technician', 'crewChief'] }).notNull(),
  crewId: integer('crew_id').references(() => crews.id),
  active: flag('active').notNull().default(true),
  createdAt: instant('created_at').notNull(),
  lastSignInAt: instant('last_sign_in_at'),
});
