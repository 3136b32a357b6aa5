import { LostFixWatch } from '@hubtack/backend/lost-fixes/lost-fix.watch.js';
import type { LostFix, LostFixDetail, LostFixList } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { lostFixDetail, lostFixList } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { correctionSources } from '@hubtack/drizzle/schema/correction-sources.js';
import { lostFixes } from '@hubtack/drizzle/schema/lost-fixes.js';
import { rovers } from '@hubtack/drizzle/schema/rovers.js';
import { eq } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { postSentences, type TestRover } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';

const S = 1000;
/** A Wednesday, 09:00 in the zone of the tests (UTC). */
const NINE = Date.parse('2026-12-02T09:00:00Z');
const allDay = [{ weekday: 3, start: '08:00', end: '17:00' }];

let server: TestServer;
let crewId: number;
let rover: TestRover;
beforeEach(async () => {
  server = await startServer();
  server.clock.set(NINE);
  crewId = await server.makeCrew('Dogwood', { pattern: allDay });
  rover = await server.makeRover('R-04', crewId);
});
afterEach(() => server.close());

/** Sentences once a second over [from, to) s after nine, then a look at the end of them. */
async function report(
  from: number,
  to: number,
  quality: number,
  change: (second: number) => Parameters<typeof gga>[2] = () => ({}),
  who = rover,
): Promise<void> {
  let body = '';
  for (let second = from; second < to; second++) body += gga(NINE + second * S, quality, change(second));
  server.clock.set(NINE + to * S);
  expect((await postSentences(server.url, who.key, body)).body.accepted).toBe(to - from);
  server.app.get(LostFixWatch).sweep();
}
function passTo(second: number): void {
  server.clock.set(NINE + second * S);
  server.app.get(LostFixWatch).sweep();
}
async function all(status = 'all'): Promise<LostFix[]> {
  const list = await (
    await server.as('dispatcher')
  ).json<LostFixList>('GET', `/api/lost-fixes?status=${status}`);
  return lostFixList.parse(list).lostFixes;
}
const seconds = (list: LostFix[]) =>
  list.map(({ kind, startAt, raisedAt, endAt, ending }) => [
    kind,
    (startAt - NINE) / S,
    (raisedAt - NINE) / S,
    endAt === null ? null : (endAt - NINE) / S,
    ending,
  ]);

describe('a lost fix', () => {
  it('raises itself after half a minute, says why, and ends when the fix has held for a quarter', async () => {
    await report(0, 100, 4);
    await report(100, 125, 5, () => ({ satellites: 5, hdop: 3.4 }));
    expect(await all()).toEqual([]);
    await report(125, 131, 5, () => ({ satellites: 5, hdop: 3.4 }));
    const [lost] = await all('active');
    expect(seconds([lost!])).toEqual([['lostFix', 100, 130, null, null]]);
    expect(lost).toMatchObject({ status: 'open', crewName: 'Dogwood', roverLabel: 'R-04' });
    expect(lost!.diagnosis).toMatchObject({
      cause: 'skyBlocked',
      evidence: ['satellites 22 → 5', 'HDOP 0.7 → 3.4', 'corrections good (age 1 s)'],
    });
    await report(131, 150, 5);
    await report(150, 164, 4);
    expect((await all())[0]!.endAt).toBeNull();
    await report(164, 165, 4);
    const [ended] = await all();
    expect(seconds([ended!])).toEqual([['lostFix', 100, 130, 150, 'regained']]);
    expect(ended).toMatchObject({ status: 'ended', diagnosisAtRaising: { cause: 'skyBlocked' } });
  });

  it('a gap of 28 s is none; one raised while it was quiet is withdrawn when the sentences come after all', async () => {
    await report(0, 100, 4);
    await report(100, 128, 5);
    await report(128, 160, 4);
    expect(await all()).toEqual([]);
    passTo(201);
    expect(seconds(await all())).toEqual([['lostFix', 169, 199, null, null]]);
    await report(160, 201, 4);
    const [withdrawn] = await all();
    expect(withdrawn).toMatchObject({ status: 'closed', ending: 'withdrawn' });
    expect(await all('active')).toEqual([]);
  });

  it('is the same after a restart in the middle of it', async () => {
    await report(0, 100, 4);
    await report(100, 140, 5);
    const before = await all();
    // A second watch over the same database knows only what is stored.
    server.app.get(LostFixWatch).forget();
    passTo(141);
    const after = await all();
    expect(after.map(({ diagnosis: _d, ...rest }) => rest)).toEqual(
      before.map(({ diagnosis: _d, ...rest }) => rest),
    );
    expect(after[0]!.diagnosis!.cause).toBe('notResolving');
  });

  it('a rover that never reports is raised ten minutes into the shift', async () => {
    server.clock.set(Date.parse('2026-12-02T07:00:00Z'));
    await server.makeRover('R-05', await server.makeCrew('Echidna', { pattern: allDay }));
    server.clock.set(Date.parse('2026-12-02T08:09:59Z'));
    server.app.get(LostFixWatch).sweep();
    expect(await all()).toEqual([]);
    server.clock.set(Date.parse('2026-12-02T08:10:01Z'));
    server.app.get(LostFixWatch).sweep();
    const [lost] = await all();
    expect(lost).toMatchObject({ kind: 'notHeard', startAt: Date.parse('2026-12-02T08:00:00Z') });
    expect(lost!.diagnosis).toMatchObject({ cause: 'notHeard' });
  });

  it('without any pattern whatever is heard counts, and it is raised as well', async () => {
    const other = await server.makeRover('R-09', await server.makeCrew('Alder'));
    await report(0, 100, 4, () => ({}), other);
    await report(100, 132, 5, () => ({}), other);
    expect(seconds((await all()).filter(({ crewName }) => crewName === 'Alder'))).toEqual([
      ['lostFix', 100, 130, null, null],
    ]);
  });
});

describe('a mount point that fails', () => {
  it('is one lost fix, and those of its rovers hang under it', async () => {
    const source = server.database
      .insert(correctionSources)
      .values({ name: 'Tannery', address: 'localhost', port: 2101, mountPoint: 'TANF00' })
      .returning()
      .get();
    const others = [];
    for (const name of ['Alder', 'Banksia', 'Currawong'])
      others.push(await server.makeRover(undefined, await server.makeCrew(name, { pattern: allDay })));
    const crew = [rover, ...others];
    server.database
      .update(rovers)
      .set({ correctionSourceId: source.id })
      .where(eq(rovers.retired, false))
      .run();
    // Anything that announces a change of the firm makes the watch read its roster anew.
    await server.makeCrew('Fernwren');
    for (const who of crew) await report(0, 100, 4, () => ({}), who);
    const stopped = (second: number) => ({ ageSeconds: second - 98 });
    for (let until = 110; until <= 220; until += 10) {
      for (const [index, who] of crew.entries()) {
        const quality = until > 130 ? 5 : 4;
        await report(until - 10, until, quality, index < 3 ? stopped : () => ({}), who);
      }
    }
    const list = await all('active');
    const shared = list.filter(({ kind }) => kind === 'mountPoint');
    expect(shared).toHaveLength(1);
    expect(shared[0]).toMatchObject({ mountPoint: 'TANF00', members: 3, startAt: NINE + 98 * S });
    expect(shared[0]!.raisedAt - shared[0]!.startAt).toBeLessThan(42 * S);
    const members = list.filter(({ sharedId }) => sharedId === shared[0]!.id);
    expect(members.map(({ crewName }) => crewName!).toSorted((a, b) => a.localeCompare(b))).toEqual([
      'Alder',
      'Banksia',
      'Dogwood',
    ]);
    for (const { diagnosis } of members) expect(diagnosis!.cause).toBe('mountPointDown');
    // The fourth lost its fix as well, with good corrections: another reason, on its own.
    expect(list.find(({ crewName }) => crewName === 'Currawong')).toMatchObject({
      sharedId: null,
      diagnosis: { cause: 'notResolving' },
    });

    // Advice on the mount point's reaches the crews under it; closing it closes theirs.
    const dispatcher = await server.as('dispatcher');
    await dispatcher.json('POST', `/api/lost-fixes/${shared[0]!.id}/advice`, { text: 'Switch to QUARB2' });
    const chief = await server.as('crewChief', crewId);
    const own = members.find(({ crewName }) => crewName === 'Dogwood')!;
    const seen = lostFixDetail.parse(await chief.json<LostFixDetail>('GET', `/api/lost-fixes/${own.id}`));
    expect(seen.advice).toMatchObject({ text: 'Switch to QUARB2', by: 'dispatcher' });
    // The chief sees the mount point's, and not whose crews else are on it.
    expect(shared[0]!.diagnosis!.evidence.join(' ')).toContain('Banksia');
    for (const path of [`/api/lost-fixes/${shared[0]!.id}`, '/api/board'])
      expect(await (await chief.call('GET', path)).text()).not.toMatch(/Alder|Banksia/);
    expect(
      (await chief.call('GET', `/api/lost-fixes/${members.find(({ crewName }) => crewName === 'Alder')!.id}`))
        .status,
    ).toBe(404);

    for (const who of crew) await report(220, 240, 4, () => ({}), who);
    for (const who of crew) await report(240, 256, 4, () => ({}), who);
    expect((await all()).filter(({ endAt }) => endAt === null)).toEqual([]);
    await dispatcher.json('POST', `/api/lost-fixes/${shared[0]!.id}/close`, {
      cause: 'baseStationFault',
      note: null,
    });
    const closed = (await all('closed')).map(({ closed: how }) => how!.cause);
    expect(closed).toEqual(['baseStationFault', 'baseStationFault', 'baseStationFault', 'baseStationFault']);
  });
});

it('crews that are moved off a mount point that failed end its lost fix, and raise none at the new one', async () => {
  const source = (mountPoint: string) =>
    server.database
      .insert(correctionSources)
      .values({ name: mountPoint, address: 'localhost', port: 2101, mountPoint })
      .returning()
      .get().id;
  const [old, next] = [source('TANF00'), source('QUARB2')];
  const move = async (id: number) => {
    server.database.update(rovers).set({ correctionSourceId: id }).run();
    await server.makeCrew(`Crew at ${id}`);
  };
  const crew = [
    rover,
    await server.makeRover(undefined, await server.makeCrew('Alder', { pattern: allDay })),
  ];
  await move(old);
  const stopped = (second: number) => ({ ageSeconds: second - 98 });
  for (const who of crew) await report(0, 100, 4, () => ({}), who);
  for (let until = 110; until <= 180; until += 10)
    for (const who of crew) await report(until - 10, until, 5, stopped, who);
  const ofMountPoints = async () => (await all()).filter(({ kind }) => kind === 'mountPoint');
  expect(await ofMountPoints()).toMatchObject([{ mountPoint: 'TANF00', endAt: null }]);
  await move(next);
  // The receivers go on with the old stream until somebody has typed in the new one.
  for (let until = 190; until <= 260; until += 10)
    for (const who of crew) await report(until - 10, until, 5, stopped, who);
  expect(await ofMountPoints()).toMatchObject([{ mountPoint: 'TANF00', endAt: expect.any(Number) }]);
  // The new one fails as well, later: that is raised.
  for (const who of crew) await report(260, 300, 4, () => ({}), who);
  const again = (second: number) => ({ ageSeconds: second - 298 });
  for (let until = 310; until <= 360; until += 10)
    for (const who of crew) await report(until - 10, until, 5, again, who);
  expect((await ofMountPoints()).map(({ mountPoint }) => mountPoint)).toEqual(['QUARB2', 'TANF00']);
});

it('sentences that come late say that there were corrections earlier in the shift', async () => {
  await report(90, 400, 1, () => ({ ageSeconds: null, stationId: null }));
  expect((await all())[0]).toMatchObject({ kind: 'noFirstFix', diagnosis: { cause: 'neverCorrected' } });
  // What the logger had kept of the minute before: float, so there were corrections.
  let body = '';
  for (let second = 10; second < 80; second++) body += gga(NINE + second * S, 5);
  await postSentences(server.url, rover.key, body);
  await report(400, 420, 1, () => ({ ageSeconds: null, stationId: null }));
  expect((await all())[0]!.diagnosis!.cause).not.toBe('neverCorrected');
});

it('a rover that was out of coverage all of yesterday and uploads it in order today: what was raised is withdrawn', async () => {
  const tuesday = NINE - 86_400_000;
  server.clock.set(tuesday - 3 * 3_600_000);
  const everyDay = [2, 3].map((weekday) => ({ weekday, start: '08:00', end: '09:00' }));
  const away = await server.makeRover('R-11', await server.makeCrew('Echidna', { pattern: everyDay }));
  server.clock.set(tuesday + 2 * 3_600_000);
  server.app.get(LostFixWatch).sweep();
  // Sign-ins of yesterday are over by now: the rows themselves.
  const ofEchidna = () =>
    server.database.select().from(lostFixes).where(eq(lostFixes.roverId, away.id)).all();
  expect(ofEchidna()).toMatchObject([{ kind: 'notHeard', ending: 'shiftEnd' }]);
  server.clock.set(NINE - 3 * 3_600_000);
  server.app.get(LostFixWatch).sweep();
  let body = '';
  for (let second = 0; second < 3600; second += 5) body += gga(tuesday - 3_600_000 + second * S, 4);
  await postSentences(server.url, away.key, body, '?date=2026-12-01');
  server.app.get(LostFixWatch).sweep();
  expect(ofEchidna()).toMatchObject([{ ending: 'withdrawn' }]);
});
