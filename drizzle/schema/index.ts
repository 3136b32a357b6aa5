// The one list of tables, for drizzle-kit and for the typed client.
export * from './audit-entries.js';
export * from './correction-sources.js';
export * from './crews.js';
export * from './display-links.js';
export * from './epochs.js';
export * from './firm-settings.js';
export * from './lost-fixes.js';
export * from './notices.js';
export * from './outbox.js';
export * from './password-links.js';
export * from './rovers.js';
export * from './shifts.js';
export * from './sign-in-sessions.js';
export * from './sites.js';
export * from './spans.js';
export * from './taps.js';
export * from './users.js';
