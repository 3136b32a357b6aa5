import type { Lane } from '@hubtack/contracts/board/lane.js';
import { checkShot, type CheckShot, type CheckShotResult } from '@hubtack/contracts/set-up/check-shot.js';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { postSentences, type Client, type TestRover } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { PASSWORD, startServer, type TestServer } from '../harness/server.js';
import { StreamReading } from '../harness/stream-reader.js';

const S = 1000;
const MINUTE = 60 * S;
const NINE = Date.parse('2026-12-02T09:00:00Z');
/** Of the control point; the antenna is 1.893 m above it. */
const mark = { latitude: -41.44, longitude: 147.14, height: 38.107, heightKind: 'geoid' };
/** 9 mm of latitude. */
const NINE_MM = 0.009 / 111_132;

let server: TestServer;
let crewId: number;
let rover: TestRover;
let chief: Client;
let controlPointId: number;
beforeEach(async () => {
  server = await startServer();
  server.clock.set(NINE);
  crewId = await server.makeCrew('Alder');
  rover = await server.makeRover('R-01', crewId);
  chief = await server.as('crewChief', crewId);
  const manager = await server.as('manager');
  const point = await manager.json<{ id: number }>('POST', '/api/control-points', {
    name: 'PM 1207',
    ...mark,
    datum: 'GDA2020',
    note: null,
  });
  controlPointId = point.id;
});
afterEach(() => server.close());

/** Sentences once a second over [from, to) s after nine. */
async function report(
  from: number,
  to: number,
  quality = 4,
  change: Parameters<typeof gga>[2] = {},
): Promise<void> {
  let body = '';
  for (let second = from; second < to; second++)
    body += gga(NINE + second * S, quality, { latitude: mark.latitude + NINE_MM, ...change });
  server.clock.set(NINE + to * S);
  await postSentences(server.url, rover.key, body);
}
const card = (poleHeightM = 1.8, confirmed: string[] = []) =>
  chief.json('POST', '/api/set-up-cards', {
    roverId: rover.id,
    poleHeightM,
    measuringPoint: 'mountBottom',
    antennaOffsetM: 0.093,
    tilt: 'calibrated',
    correctionSourceId: null,
    messageFormat: 'any',
    toleranceProfile: null,
    checkedBy: 'Crew chief',
    confirmed,
  });
const shotBody = (change: Record<string, unknown> = {}) => ({
  roverId: rover.id,
  controlPointId,
  measure: { from: 'epochs', epochs: 10 },
  ...change,
});
const shoot = (change: Record<string, unknown> = {}) =>
  chief.json<CheckShot>('POST', '/api/check-shots', shotBody(change));
async function badge(): Promise<Lane['checkShot']> {
  const { lanes } = await chief.json<{ lanes: Lane[] }>('GET', '/api/board');
  return lanes[0]!.checkShot;
}

describe('a check shot', () => {
  it('is the mean of the newest fixed epochs against the mark: seen first, then kept, then on the board', async () => {
    await card();
    await report(0, 30);
    const preview = await chief.json<CheckShotResult>('POST', '/api/check-shots/preview', shotBody());
    expect(await badge()).toBeNull();
    const shot = checkShot.parse(await shoot());
    expect(shot).toMatchObject({
      ...preview,
      controlPointName: 'PM 1207',
      datum: 'GDA2020',
      epochs: 10,
      firstAt: new Date(NINE + 20 * S).toISOString(),
      lastAt: new Date(NINE + 29 * S).toISOString(),
      passed: true,
      stationId: 1,
      crewName: 'Alder',
      by: 'crewChief',
    });
    expect(shot.difference.northM).toBeCloseTo(0.009, 4);
    expect(shot.difference.eastM).toBeCloseTo(0, 4);
    expect(shot.difference.upM).toBeCloseTo(0, 3);
    expect(shot.poleHeightM).toBeCloseTo(1.893, 6);
    expect(shot.warnings).toEqual(['Nothing is transformed: the rover must give positions in GDA2020.']);
    expect(await badge()).toEqual({ at: NINE + 30 * S, horizontalMm: 9, passed: true, again: null });
    const list = await chief.json<{ checkShots: CheckShot[] }>('GET', '/api/check-shots?date=2026-12-02');
    expect(list.checkShots).toEqual([shot]);
  });
  it('with the wrong pole height fails in height', async () => {
    await card(2);
    await report(0, 30);
    const shot = await shoot();
    expect(shot.passed).toBe(false);
    expect(shot.difference.upM).toBeCloseTo(-0.2, 3);
  });
  it('takes no float for fixed, and says how many there are', async () => {
    await report(0, 4);
    await report(4, 30, 5);
    const answer = await chief.call('POST', '/api/check-shots/preview', shotBody());
    expect(answer.status).toBe(400);
    expect(await answer.json()).toMatchObject({
      errors: [
        {
          pointer: '/measure/epochs',
          detail: 'There are 4 fixed positions of the last quarter of an hour, and 10 are asked for.',
        },
      ],
    });
  });
  it('says what speaks against it: old corrections, a base that changed, epochs of a while ago', async () => {
    await card();
    await report(0, 15);
    await report(15, 30, 4, { ageSeconds: 14, stationId: 2 });
    await report(30, 90, 5);
    const shot = await shoot({ measure: { from: 'epochs', epochs: 20 } });
    expect(shot).toMatchObject({ passed: true, stationId: 2, lastAt: new Date(NINE + 29 * S).toISOString() });
    for (const words of ['up to 14 s old', 'The base changed', 'newest fixed epoch is 61 s old'])
      expect(shot.warnings).toContainEqual(expect.stringContaining(words));
  });
  it('far from the control point is refused: it is another one', async () => {
    await report(0, 30, 4, { latitude: mark.latitude + 0.01 });
    const answer = await chief.call('POST', '/api/check-shots', shotBody());
    expect(answer.status).toBe(400);
    expect(await answer.text()).toContain('1111 m from PM 1207');
  });
  it('may be typed in, reduced to the ground by the controller', async () => {
    const measure = { from: 'typed', ...mark, heightM: 38.13, latitude: mark.latitude };
    const shot = await shoot({ measure });
    expect(shot.difference.upM).toBeCloseTo(0.023, 6);
    expect(shot).toMatchObject({ epochs: null, scatter: null, passed: true });
  });
  it('of another crew does not exist for a chief', async () => {
    await report(0, 30);
    const { id } = await shoot();
    const stranger = await server.as('crewChief', await server.makeCrew('Echidna'));
    expect((await stranger.call('GET', `/api/check-shots/${id}`)).status).toBe(404);
    expect((await stranger.call('GET', `/api/check-shots?roverId=${rover.id}`)).status).toBe(404);
    expect((await stranger.call('POST', '/api/check-shots', shotBody())).status).toBe(404);
    expect(await stranger.json('GET', '/api/check-shots')).toEqual({ checkShots: [] });
  });
});

describe('it counts until', () => {
  beforeEach(async () => {
    await card();
    await report(0, 30);
    await shoot();
    expect((await badge())!.again).toBeNull();
  });
  it('the base changes', async () => {
    await report(30, 40, 4, { stationId: 2 });
    await expect.poll(async () => (await badge())!.again).toBe('baseChanged');
  });
  it('the set-up card says something else', async () => {
    await card(1.8);
    expect((await badge())!.again).toBeNull();
    await card(2, ['eighteenAgainstTwenty']);
    expect((await badge())!.again).toBe('cardChanged');
  });
  it('the fix was lost for longer than the firm allows, and boards are told', async () => {
    const stream = await StreamReading.open(chief);
    try {
      await report(30, 30 + 9 * 60, 5);
      await report(30 + 9 * 60, 30 + 10 * 60, 4);
      expect((await badge())!.again).toBeNull();
      await report(30 + 10 * 60, 30 + 21 * 60, 5);
      await stream.waitFor('lanes', ({ data }) =>
        (data as { lanes: Lane[] }).lanes.some((lane) => lane.checkShot?.again === 'fixLost'),
      );
    } finally {
      stream.close();
    }
  });
  it('the next day', async () => {
    server.clock.set(NINE + 24 * 60 * MINUTE);
    await chief.signIn(`crewchief${crewId}@pennywort.example`, PASSWORD);
    await card(1.8);
    expect((await badge())!.again).toBe('newDay');
  });
});
