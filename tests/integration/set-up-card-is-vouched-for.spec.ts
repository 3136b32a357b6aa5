import type { Lane } from '@hubtack/contracts/board/lane.js';
import type { Ground, SetUpCard, SetUpStart } from '@hubtack/contracts/set-up/set-up-card.js';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { postSentences, type Client, type TestRover } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { PASSWORD, startServer, type TestServer } from '../harness/server.js';

const NINE = Date.parse('2026-12-02T09:00:00Z');
const HOUR = 3_600_000;
let server: TestServer;
let crewId: number;
let rover: TestRover;
let chief: Client;
beforeEach(async () => {
  server = await startServer();
  server.clock.set(NINE);
  crewId = await server.makeCrew('Dogwood');
  rover = await server.makeRover('R-04', crewId);
  chief = await server.as('crewChief', crewId);
});
afterEach(() => server.close());

const body = (change: Record<string, unknown> = {}) => ({
  roverId: rover.id,
  poleHeightM: 1.8,
  measuringPoint: 'mountBottom',
  antennaOffsetM: 0.093,
  tilt: 'calibrated',
  correctionSourceId: null,
  messageFormat: 'msm',
  toleranceProfile: 'topographic',
  checkedBy: 'Crew chief',
  ...change,
});
const add = (change: Record<string, unknown> = {}, key?: string) =>
  chief.call('POST', '/api/set-up-cards', body(change), key === undefined ? {} : { 'idempotency-key': key });
const cards = async () =>
  (await chief.json<{ cards: SetUpCard[] }>('GET', `/api/set-up-cards?roverId=${rover.id}`)).cards;
const lane = async () => (await chief.json<{ lanes: Pick<Lane, 'setUp'>[] }>('GET', '/api/board')).lanes[0]!;

describe('a set-up card', () => {
  it('is kept with who vouched for it, offered as a start, and seen on the board that day', async () => {
    expect((await lane()).setUp).toBeNull();
    expect((await add()).status).toBe(201);
    expect(await cards()).toMatchObject([
      {
        poleHeightM: 1.8,
        by: 'crewChief',
        checkedBy: 'Crew chief',
        crewId,
        roverLabel: 'R-04',
        confirmed: [],
      },
    ]);
    expect((await lane()).setUp).toEqual({ at: NINE, by: 'crewChief', poleHeightM: 1.8 });
    server.clock.set(NINE + 24 * HOUR);
    await chief.signIn(`crewchief${crewId}@pennywort.example`, PASSWORD);
    const start = await chief.json<SetUpStart>('GET', `/api/set-up-cards/start?roverId=${rover.id}`);
    expect(start).toMatchObject({ card: { poleHeightM: 1.8 }, toleranceProfile: 'topographic' });
  });
  it('with another pole height is refused until it is confirmed, with both heights in words', async () => {
    await add();
    server.clock.advance(HOUR);
    const refused = await add({ poleHeightM: 2 });
    expect(refused.status).toBe(409);
    expect(await refused.json()).toMatchObject({
      code: 'needsConfirmation',
      errors: [{ pointer: '/poleHeightM', detail: expect.stringContaining('1.800 m on the card before') }],
    });
    expect(await cards()).toHaveLength(1);
    expect((await add({ poleHeightM: 2, confirmed: ['eighteenAgainstTwenty', 'poleStep'] })).status).toBe(
      201,
    );
    expect((await cards())[0]).toMatchObject({ poleHeightM: 2, confirmed: ['eighteenAgainstTwenty'] });
  });
  it('tapped without signal is kept once, with the time of the tap', async () => {
    server.clock.advance(2 * HOUR);
    const at = new Date(NINE + HOUR).toISOString();
    const first = await add({ at }, 'tap-1');
    const again = await add({ at }, 'tap-1');
    expect([first.status, again.status]).toEqual([201, 201]);
    expect(await cards()).toMatchObject([{ at }]);
    expect((await add({ at: new Date(NINE - 40 * HOUR).toISOString() })).status).toBe(400);
  });
  it('says which source the crew takes its corrections from: the office sees that', async () => {
    const technician = await server.as('technician');
    const { id } = await technician.json<{ id: number }>('POST', '/api/correction-sources', {
      name: 'Quarry',
      address: 'caster.pennywort.example',
      port: 2101,
      mountPoint: 'QUARB2',
    });
    expect((await add({ correctionSourceId: id })).status).toBe(201);
    const rovers = await technician.json<{ mountPoint: string | null }[]>('GET', '/api/rovers');
    expect(rovers[0]!.mountPoint).toBe('QUARB2');
    const unknown = await add({ correctionSourceId: 999, confirmed: [] });
    expect(unknown.status).toBe(400);
    expect(await unknown.json()).toMatchObject({ errors: [{ pointer: '/correctionSourceId' }] });
  });
  it.each([
    [{ poleHeightM: -1 }, '/poleHeightM'],
    [{ poleHeightM: '1.8' }, '/poleHeightM'],
    [{ antennaOffsetM: 9 }, '/antennaOffsetM'],
    [{ checkedBy: ' ' }, '/checkedBy'],
    [{ tilt: 'perhaps' }, '/tilt'],
  ])('%j is refused beside its field', async (change, pointer) => {
    const answer = await add(change);
    expect(answer.status).toBe(400);
    expect(await answer.json()).toMatchObject({ errors: [{ pointer }] });
  });
  it('of another crew does not exist for a chief', async () => {
    await add();
    const [{ id }] = (await cards()) as [SetUpCard];
    const stranger = await server.as('crewChief', await server.makeCrew('Echidna'));
    for (const path of [
      `/api/set-up-cards/${id}`,
      `/api/set-up-cards?roverId=${rover.id}`,
      `/api/set-up-cards/start?roverId=${rover.id}`,
      `/api/set-up-cards/ground?roverId=${rover.id}&poleHeightM=1.8`,
    ])
      expect((await stranger.call('GET', path)).status).toBe(404);
    expect((await stranger.call('POST', '/api/set-up-cards', body())).status).toBe(404);
  });
});

it('the ground height under the pole comes from the newest sentence', async () => {
  const path = `/api/set-up-cards/ground?roverId=${rover.id}&poleHeightM=1.8&antennaOffsetM=0.093`;
  expect(await chief.json<Ground>('GET', path)).toEqual({
    at: null,
    state: 'silent',
    aboveGeoidM: null,
    aboveEllipsoidM: null,
  });
  await postSentences(server.url, rover.key, gga(NINE, 4, { altitudeM: 40, geoidSeparationM: -3 }));
  const ground = await chief.json<Ground>('GET', path);
  expect(ground).toMatchObject({ at: new Date(NINE).toISOString(), state: 'fixed' });
  expect(ground.aboveGeoidM).toBeCloseTo(38.107, 6);
  expect(ground.aboveEllipsoidM).toBeCloseTo(35.107, 6);
  const toPhaseCentre = await chief.json<Ground>('GET', `${path}&measuringPoint=phaseCentre`);
  expect(toPhaseCentre.aboveGeoidM).toBeCloseTo(38.2, 6);
  server.clock.advance(60_000);
  expect((await chief.json<Ground>('GET', path)).state).toBe('silent');
  await postSentences(server.url, rover.key, gga(NINE + 60_000, 0, { altitudeM: 0 }));
  expect(await chief.json<Ground>('GET', path)).toMatchObject({ state: 'none', aboveGeoidM: null });
});
