import { LostFixWatch } from '@hubtack/backend/lost-fixes/lost-fix.watch.js';
import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { crewDay, type CrewDayView, type Shift } from '@hubtack/contracts/shifts/shift.js';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { postSentences, type Client, type TestRover } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';

const at = (clock: string) => Date.parse(`2026-12-02T${clock}Z`);
const iso = (clock: string) => `2026-12-02T${clock}Z`;

let server: TestServer;
let crewId: number;
let rover: TestRover;
let chief: Client;
let dispatcher: Client;
beforeEach(async () => {
  server = await startServer();
  server.clock.set(at('06:00:00'));
  crewId = await server.makeCrew('Dogwood', { pattern: [{ weekday: 3, start: '08:00', end: '16:00' }] });
  rover = await server.makeRover('R-04', crewId);
  chief = await server.as('crewChief', crewId);
  dispatcher = await server.as('dispatcher');
});
afterEach(() => server.close());

const day = async (who = chief): Promise<CrewDayView> =>
  crewDay.parse(await who.json('GET', `/api/crews/${crewId}/day`));
async function step(
  name: string,
  clock: string,
  body: Record<string, unknown> = {},
  who = chief,
): Promise<Response> {
  server.clock.set(Math.max(server.clock.now(), at(clock)));
  return who.call('POST', `/api/crews/${crewId}/shift/${name}`, { at: iso(clock), ...body });
}
const hours = (view: CrewDayView) =>
  view.onShift.map(({ start, end }) =>
    [start, end].map((time) => (time === view.dayEnd ? 'open' : new Date(time).toISOString().slice(11, 16))),
  );
async function lostFixes(): Promise<LostFix[]> {
  server.app.get(LostFixWatch).sweep();
  return (await dispatcher.json<{ lostFixes: LostFix[] }>('GET', '/api/lost-fixes?status=all')).lostFixes;
}

describe('start, pause, resume, finish', () => {
  it('make the day, with who marked it', async () => {
    expect(await day()).toMatchObject({ basis: 'pattern', duty: 'offShift' });
    expect((await step('start', '07:10:00')).status).toBe(200);
    await step('pause', '11:30:00', { reason: 'lunch' }, dispatcher);
    expect(await day()).toMatchObject({ basis: 'marks', duty: 'paused' });
    await step('resume', '12:00:00');
    await step('finish', '15:20:00');
    const view = await day();
    expect(hours(view)).toEqual([
      ['07:10', '11:30'],
      ['12:00', '15:20'],
    ]);
    expect(view.shifts).toMatchObject([
      {
        startedBy: 'crewChief',
        endedBy: 'crewChief',
        pauses: [{ reason: 'lunch', by: 'dispatcher', start: at('11:30:00'), end: at('12:00:00') }],
      },
    ]);
  });
  it('a step that is so already is refused and says what is so', async () => {
    await step('start', '07:10:00');
    for (const [name, body, detail] of [
      ['start', {}, 'The shift has been running since 07:10.'],
      ['resume', {}, 'The shift is not paused at 07:20.'],
      ['pause', {}, 'A pause needs a reason.'],
    ] as const) {
      const answer = await step(name, '07:20:00', body);
      expect(answer.status).toBe(409);
      expect(await answer.json()).toMatchObject({ code: 'conflict', detail });
    }
    expect((await chief.call('POST', `/api/crews/${crewId}/shift/nap`, {})).status).toBe(400);
  });
  it('a pause in a planned shift makes it marks from its planned beginning to its planned end', async () => {
    await step('pause', '12:00:00', { reason: 'driving' });
    await step('resume', '12:30:00');
    expect(hours(await day())).toEqual([
      ['08:00', '12:00'],
      ['12:30', '16:00'],
    ]);
  });
  it('what was tapped without signal counts at the time of the tap', async () => {
    server.clock.set(at('13:00:00'));
    await step('start', '07:10:00');
    await step('pause', '11:30:00', { reason: 'lunch' });
    await step('resume', '12:10:00');
    expect(hours(await day())).toEqual([
      ['07:10', '11:30'],
      ['12:10', 'open'],
    ]);
  });
});

describe('lost fixes and marks', () => {
  async function reportFixed(from: string, to: string): Promise<void> {
    let body = '';
    for (let time = at(from); time < at(to); time += 5000) body += gga(time, 4);
    server.clock.set(at(to));
    await postSentences(server.url, rover.key, body);
  }
  it('switched off in the lunch break is none; a pause that is marked late takes the loss away', async () => {
    await step('start', '07:10:00');
    await reportFixed('11:00:00', '11:30:00');
    server.clock.set(at('11:33:00'));
    expect((await lostFixes()).filter(({ kind }) => kind === 'lostFix')).toMatchObject([
      { status: 'open', startAt: at('11:30:05') },
    ]);
    await step('pause', '11:30:00', { reason: 'lunch' });
    expect((await lostFixes()).filter(({ kind }) => kind === 'lostFix')).toMatchObject([
      { status: 'closed', ending: 'withdrawn' },
    ]);
  });
  it('finishing the shift ends what is open', async () => {
    await step('start', '07:10:00');
    await reportFixed('11:00:00', '11:10:00');
    server.clock.set(at('11:12:00'));
    expect((await lostFixes()).filter(({ endAt }) => endAt === null)).toHaveLength(1);
    await step('finish', '11:12:30');
    expect((await lostFixes()).find(({ kind }) => kind === 'lostFix')).toMatchObject({
      endAt: at('11:12:30'),
      ending: 'shiftEnd',
    });
  });
});

describe('marks set right afterwards', () => {
  const body = (start: string, end: string | null, pauses: unknown[] = []) => ({
    start: iso(start),
    end: end && iso(end),
    pauses,
  });
  it('by the office, with an audit entry; not by a chief', async () => {
    await step('start', '07:10:00');
    const [shift] = (await day()).shifts as [Shift];
    server.clock.set(at('17:00:00'));
    const lunch = { start: iso('11:30:00'), end: iso('12:00:00'), reason: 'lunch' };
    expect((await chief.call('PUT', `/api/shifts/${shift.id}`, body('07:10:00', '15:00:00'))).status).toBe(
      403,
    );
    await dispatcher.json('PUT', `/api/shifts/${shift.id}`, body('07:10:00', '15:00:00', [lunch]));
    const view = await day();
    expect(hours(view)).toEqual([
      ['07:10', '11:30'],
      ['12:00', '15:00'],
    ]);
    expect(view.shifts).toMatchObject([{ startedBy: 'crewChief', endedBy: 'dispatcher' }]);
    const { entries } = await (
      await server.as('manager')
    ).json<{ entries: { action: string; subject: string }[] }>('GET', '/api/audit');
    expect(entries[0]).toMatchObject({ action: 'shift.changed', subject: 'Dogwood' });
    await dispatcher.json('DELETE', `/api/shifts/${shift.id}`);
    expect((await day()).basis).toBe('pattern');
  });
  it('leave the name on a pause that nobody touched', async () => {
    await step('start', '07:10:00');
    await step('pause', '09:00:00', { reason: 'driving' });
    await step('resume', '09:20:00');
    const [shift] = (await day()).shifts as [Shift];
    server.clock.set(at('17:00:00'));
    const driving = { start: iso('09:00:00'), end: iso('09:20:00'), reason: 'driving' };
    const lunch = { start: iso('11:30:00'), end: iso('12:00:00'), reason: 'lunch' };
    const marks = body('07:10:00', '15:00:00', [lunch, driving]);
    await dispatcher.json('PUT', `/api/shifts/${shift.id}`, marks);
    expect((await day()).shifts[0]!.pauses).toMatchObject([{ by: 'crewChief' }, { by: 'dispatcher' }]);
  });
  it.each([
    ['end before start', body('12:00:00', '11:00:00'), '/end'],
    [
      'pause outside',
      body('08:00:00', '12:00:00', [{ start: iso('07:00:00'), end: iso('07:30:00'), reason: 'lunch' }]),
      '/pauses',
    ],
    [
      'pauses that overlap',
      body('08:00:00', '12:00:00', [
        { start: iso('09:00:00'), end: iso('10:00:00'), reason: 'lunch' },
        { start: iso('09:30:00'), end: iso('10:30:00'), reason: 'lunch' },
      ]),
      '/pauses',
    ],
    ['over another shift', body('13:00:00', '14:00:00'), '/start'],
    ['to come', body('23:00:00', null), '/start'],
  ])('refuses %s, beside its field', async (_what, wrong, pointer) => {
    server.clock.set(at('17:00:00'));
    await dispatcher.json('POST', `/api/crews/${crewId}/shifts`, body('12:30:00', '16:00:00'));
    const answer = await dispatcher.call('POST', `/api/crews/${crewId}/shifts`, wrong);
    expect(answer.status).toBe(400);
    expect(await answer.json()).toMatchObject({ errors: [{ pointer }] });
  });
});
