import { roles } from '@hubtack/contracts/auth/role.js';
import { flagWords, lostFixKinds } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { noticeSubjects, noticeWays } from '@hubtack/contracts/notices/notice.js';
import * as fc from 'fast-check';
import { expect, it } from 'vitest';
import { noticeTimes } from './notice-day.js';
import { dueNotices, type DueNotice } from './notice-policy.js';
import type { PolicyLostFix, PolicyPerson } from './notice-tellings.js';

const instant = fc.integer({ min: 0, max: 60 }).map((minutes) => minutes * 60_000);
const sometimes = fc.option(instant, { nil: null });
const crewId = fc.constantFrom(10, 11);
const MOUNT_POINT = 100;

const lostFixOf = (id: number) =>
  fc.record<PolicyLostFix>({
    id: fc.constant(id),
    kind: fc.constantFrom(...lostFixKinds.filter((kind) => kind !== 'mountPoint')),
    crewId,
    raisedAt: instant,
    endAt: sometimes,
    closedAt: sometimes,
    sharedId: fc.constantFrom(null, null, MOUNT_POINT),
    flagAt: sometimes,
    flagWord: fc.constantFrom(null, ...flagWords),
    shelvedUntil: sometimes,
    backAt: sometimes,
    isChattering: fc.boolean(),
    takenAt: sometimes,
    takenByUserId: fc.constantFrom(1, 2),
    advice: fc.uniqueArray(fc.record({ id: fc.integer({ min: 1, max: 4 }), at: instant }), {
      selector: (one) => one.id,
      maxLength: 3,
    }),
  });
const standing = fc
  .tuple(
    lostFixOf(1),
    lostFixOf(2),
    lostFixOf(3),
    lostFixOf(MOUNT_POINT).map((one) => ({
      ...one,
      kind: 'mountPoint' as const,
      crewId: null,
      sharedId: null,
    })),
  )
  .map((all) => [...all]);
const person = fc.record<PolicyPerson>({
  userId: fc.constant(1),
  role: fc.constantFrom(...roles),
  crewId,
  rules: fc.uniqueArray(
    fc.record({
      subject: fc.constantFrom(...noticeSubjects),
      way: fc.constantFrom(...noticeWays),
      afterMinutes: fc.constantFrom(0, 0, 5, 10, 30),
    }),
    { selector: ({ subject, way }) => `${subject} ${way}`, maxLength: 30 },
  ),
});

function expectAllowed({ role, crewId }: PolicyPerson, all: readonly PolicyLostFix[], notice: DueNotice) {
  const told = all.find(({ id }) => id === notice.lostFixId)!;
  const isFree =
    notice.subject === 'advice' || (notice.subject === 'flag' && told.flagWord === 'fixLooksWrong');
  expect(notice.ways.length).toBeGreaterThan(0);
  expect(told.closedAt).toBeNull();
  if (!isFree) expect([told.sharedId, told.endAt, told.isChattering]).toEqual([null, null, false]);
  if (role !== 'crewChief') return;
  const theirs = told.kind === 'mountPoint' ? all.filter((one) => one.sharedId === told.id) : [told];
  expect(theirs.some((one) => one.crewId === crewId)).toBe(true);
}

it('never twice for one due key, never for what hangs under a mount point, whatever the order of calls', () => {
  fc.assert(
    fc.property(person, fc.array(fc.tuple(instant, standing), { maxLength: 12 }), (who, calls) => {
      const told = new Set<string>();
      for (const [now, lostFixes] of calls) {
        for (const notice of dueNotices(who, lostFixes, told, now).notices) {
          expect(told).not.toContain(notice.dueKey);
          told.add(notice.dueKey);
          expectAllowed(who, lostFixes, notice);
        }
        expect(dueNotices(who, lostFixes, told, now).notices).toEqual([]);
      }
    }),
    { numRuns: 1000 },
  );
});

it('whoever looks only when told to look next is told the same as who looks every half minute', () => {
  fc.assert(
    fc.property(person, standing, (who, lostFixes) => {
      const watch = (next: (now: number, nextAt: number | null) => number | null) => {
        const told = new Set<string>();
        for (let now: number | null = 0; now !== null && now <= 7_200_000;) {
          const { notices, nextAt } = dueNotices(who, lostFixes, told, now);
          for (const { dueKey } of notices) told.add(dueKey);
          now = next(now, nextAt);
        }
        return [...told].toSorted();
      };
      expect(watch((_now, nextAt) => nextAt)).toEqual(watch((now) => now + 30_000));
    }),
    { numRuns: 500 },
  );
});

it('a day in order: once for each due key, and nothing at an instant at which its lost fix had ended', () => {
  fc.assert(
    fc.property(person, standing, (who, lostFixes) => {
      const times = noticeTimes(who, lostFixes);
      expect(new Set(times.map(({ dueKey }) => dueKey)).size).toBe(times.length);
      expect(times.map(({ at }) => at)).toEqual(times.map(({ at }) => at).toSorted((a, b) => a - b));
      for (const { at, lostFixId, subject } of times) {
        const { endAt, closedAt, flagWord } = lostFixes.find(({ id }) => id === lostFixId)!;
        expect(closedAt ?? Infinity).toBeGreaterThan(at);
        if (subject !== 'advice' && flagWord !== 'fixLooksWrong')
          expect(endAt ?? Infinity).toBeGreaterThan(at);
      }
    }),
    { numRuns: 500 },
  );
});
