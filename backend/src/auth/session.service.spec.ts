import { displayLinks } from '@hubtack/drizzle/schema/display-links.js';
import { auditEntries } from '@hubtack/drizzle/schema/audit-entries.js';
import { refreshTokens } from '@hubtack/drizzle/schema/sign-in-sessions.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { makeTestDatabase } from '@hubtack/drizzle/testing/test-database.js';
import { eq } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { AuditService } from '../audit/audit.service.js';
import { Changes } from '../common/changes.js';
import type { ProblemException } from '../common/problem.exception.js';
import { SessionService } from './session.service.js';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;

let now: number;
let store: ReturnType<typeof makeTestDatabase>;
let sessions: SessionService;
let ended: string[];
let userId: number;

beforeEach(() => {
  now = Date.parse('2026-10-05T00:00:00Z');
  store = makeTestDatabase();
  const clock = { now: () => now };
  const changes = new Changes();
  ended = [];
  changes.all.subscribe((change) => {
    if (change.kind === 'sessions') ended.push(...change.sessionIds);
  });
  sessions = new SessionService(store.database, clock, changes, new AuditService(store.database, clock));
  userId = store.database
    .insert(users)
    .values({ name: 'Dispatcher', email: 'dispatcher@pennywort.example', role: 'dispatcher', createdAt: now })
    .returning()
    .get().id;
});
afterEach(() => store.remove());

const codeOf = (act: () => unknown): string => {
  try {
    act();
  } catch (error) {
    return (error as ProblemException).code;
  }
  return 'none';
};

describe('a refresh token', () => {
  it('is stored as a hash only', () => {
    const { refreshToken } = sessions.start({ userId });
    sessions.refresh(refreshToken);
    const stored = JSON.stringify(store.database.select().from(refreshTokens).all());
    expect(stored).not.toContain(refreshToken);
  });
  it('used by two tabs within ten seconds is no theft', () => {
    const first = sessions.start({ userId });
    now += 60_000;
    const tab = sessions.refresh(first.refreshToken);
    now += 10_000;
    const otherTab = sessions.refresh(first.refreshToken);
    now += 60_000;
    expect(sessions.refresh(otherTab.refreshToken).sessionId).toBe(first.sessionId);
    expect(sessions.refresh(tab.refreshToken).sessionId).toBe(first.sessionId);
    expect(ended).toEqual([]);
  });
  it('used again after ten seconds ends the whole family, is announced, and stands in the audit', () => {
    const first = sessions.start({ userId });
    const second = sessions.refresh(first.refreshToken);
    now += 10_001;
    expect(codeOf(() => sessions.refresh(first.refreshToken))).toBe('tokenReused');
    expect(ended).toEqual([first.sessionId]);
    expect(codeOf(() => sessions.refresh(second.refreshToken))).toBe('signInEnded');
    expect(codeOf(() => sessions.viewer(first.sessionId))).toBe('signInEnded');
    expect(store.database.select().from(auditEntries).all()).toMatchObject([
      { action: 'signIn.tokenReused', subject: 'Dispatcher' },
    ]);
  });
  it('two steps back is theft at once, within ten seconds too', () => {
    const first = sessions.start({ userId });
    now += 1000;
    const second = sessions.refresh(first.refreshToken);
    now += 1000;
    sessions.refresh(second.refreshToken);
    now += 1000;
    expect(codeOf(() => sessions.refresh(first.refreshToken))).toBe('tokenReused');
  });
  it('that nobody was given changes nothing', () => {
    const { sessionId } = sessions.start({ userId });
    expect(codeOf(() => sessions.refresh('x'.repeat(43)))).toBe('signInEnded');
    expect(sessions.viewer(sessionId).role).toBe('dispatcher');
  });
});

describe('a person\u2019s sign-in', () => {
  it('lives for twelve hours more at each use, and for seven days in all', () => {
    let session = sessions.start({ userId });
    const begun = now;
    while (now + 11 * HOUR < begun + 7 * DAY) {
      now += 11 * HOUR;
      session = sessions.refresh(session.refreshToken);
    }
    expect(session.endsAt).toBe(begun + 7 * DAY);
    now = begun + 7 * DAY - 1;
    expect(sessions.viewer(session.sessionId).userId).toBe(userId);
    now += 1;
    expect(codeOf(() => sessions.viewer(session.sessionId))).toBe('signInEnded');
    expect(codeOf(() => sessions.refresh(session.refreshToken))).toBe('signInEnded');
  });
  it('takes role and crew from the database, and is nobody once the account is off', () => {
    const { sessionId } = sessions.start({ userId });
    const change = (set: Partial<typeof users.$inferInsert>) =>
      store.database.update(users).set(set).where(eq(users.id, userId)).run();
    change({ role: 'technician' });
    expect(sessions.viewer(sessionId).role).toBe('technician');
    change({ active: false });
    expect(codeOf(() => sessions.viewer(sessionId))).toBe('signInEnded');
  });
});

it('a display lasts a year, and keeps no more than a month of used tokens', () => {
  const link = { name: 'Wall', tokenHash: 'h', createdAt: now };
  const displayLinkId = store.database.insert(displayLinks).values(link).returning().get().id;
  let session = sessions.start({ displayLinkId });
  const begun = now;
  for (let day = 1; day < 365; day++) {
    now = begun + day * DAY;
    session = sessions.refresh(session.refreshToken);
  }
  expect(sessions.viewer(session.sessionId)).toMatchObject({ role: 'display', name: 'Wall', crewId: null });
  expect(store.database.select().from(refreshTokens).all().length).toBeLessThan(33);
  now = begun + 365 * DAY;
  expect(codeOf(() => sessions.viewer(session.sessionId))).toBe('signInEnded');
});
