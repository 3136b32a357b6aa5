import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';
import { displayLinks } from './display-links.js';
import { users } from './users.js';

/** A sign-in and all refresh tokens that descend from it (its family). Of a person, or of a wall display. */
export const signInSessions = sqliteTable(
  'sign_in_sessions',
  {
    id: text('id').primaryKey(),
    userId: integer('user_id').references(() => users.id),
    displayLinkId: integer('display_link_id').references(() => displayLinks.id),
    createdAt: instant('created_at').notNull(),
    expiresAt: instant('expires_at').notNull(),
    endedAt: instant('ended_at'),
    endReason: text('end_reason', { enum: ['signOut', 'tokenReused', 'accountChanged', 'linkRevoked'] }),
  },
  (table) => [
    // Ending every sign-in of a person when the account or its role changes.
    index('sign_in_sessions_user').on(table.userId),
  ],
);

/** SHA-256 of each refresh token handed out. One used twice shows theft: the family ends. */
export const refreshTokens = sqliteTable(
  'refresh_tokens',
  {
    tokenHash: text('token_hash').primaryKey(),
    sessionId: text('session_id')
      .notNull()
      .references(() => signInSessions.id, { onDelete: 'cascade' }),
    issuedAt: instant('issued_at').notNull(),
    usedAt: instant('used_at'),
  },
  (table) => [
    // Cascading delete of an old sign-in's tokens.
    index('refresh_tokens_session').on(table.sessionId),
  ],
);
