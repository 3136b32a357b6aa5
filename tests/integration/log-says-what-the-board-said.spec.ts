import type { Log, LogWithDetail } from '@hubtack/contracts/logs/log.js';
import { writeRmc } from '@hubtack/contracts/nmea/sentence-writer.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { postSentences } from '../harness/client.js';
import { analysed } from '../harness/log-upload.js';
import { published, recording } from '../harness/recordings.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';
import { timelineOf } from '../harness/timeline.js';

let server: TestServer;
beforeAll(async () => {
  server = await startServer({ RAW_EPOCH_DAYS: '100000' });
});
afterAll(() => server.close());

const noon = Date.UTC(2026, 9, 7, 12);
const dated = (time: number, quality: number, change: Parameters<typeof gga>[2] = {}): string =>
  gga(time, quality, change) + writeRmc({ time, latitude: -41, longitude: 147 });
/** One epoch a second with the quality that each has. */
const seconds = (
  from: number,
  to: number,
  quality: number,
  change: (second: number) => Parameters<typeof gga>[2] = () => ({}),
): string =>
  Array.from({ length: to - from }, (_, index) =>
    dated(noon + (from + index) * 1000, quality, change(from + index)),
  ).join('');

/** Counted from the recordings by hand and by script: tests/fixtures/README.md. */
const counted = {
  [published.walk.file]: {
    sentences: 2010,
    ggaSentences: 536,
    ignored: 938,
    medianSatellites: 12,
    maxAgeSeconds: 1.3,
    changes: [
      ['fixed', 'float'],
      ['float', 'fixed'],
      ['fixed', 'float'],
    ],
  },
  [published.rtkLog.file]: {
    sentences: 244,
    ggaSentences: 122,
    ignored: 9,
    medianSatellites: 9,
    maxAgeSeconds: 14.8,
    changes: [
      ['code', 'silent'],
      ['silent', 'fixed'],
    ],
  },
};

describe.each([published.walk, published.rtkLog])('$file', (expected) => {
  it('gives the published figures, and those of its rover\u2019s timeline', async () => {
    const technician = await server.as('technician');
    const log = await analysed(technician, recording(expected.file));
    const { changes, ...counts } = counted[expected.file];
    expect(log).toMatchObject({ status: 'done', progress: 1, problem: null, roverId: null });
    expect(log.summary).toMatchObject({
      ...counts,
      badChecksum: 0,
      malformed: 0,
      untimed: 0,
      epochs: expected.epochs,
      duplicates: 0,
      firstTime: expected.from,
      lastTime: expected.to,
      totals: expected.totals,
      moreTransitions: 0,
    });
    expect(log.summary!.transitions).toEqual(
      changes.map(([from, to], index) => ({ time: expected.changes[index], from, to })),
    );
    expect(log.detail).toMatchObject({ dateFrom: 'sentences', notes: [], history: null, rejected: [] });

    const rover = await server.makeRover();
    const { body } = await postSentences(server.url, rover.key, recording(expected.file));
    expect(body).toMatchObject({ accepted: log.summary!.epochs, ignored: log.summary!.ignored });
    const timeline = await timelineOf(technician, rover.id, log.summary!.firstTime!, log.summary!.lastTime!);
    expect(timeline.totals).toEqual(log.summary!.totals);
    expect(
      timeline.spans.map(({ state, start, end }) => [state, Date.parse(start), Date.parse(end)]),
    ).toEqual(log.detail!.spans.map(({ state, start, end }) => [state, start, end]));
  });

  it('is the same with every line ending, and under any order of epochs that a ring buffer leaves', async () => {
    const technician = await server.as('technician');
    const whole = (await analysed(technician, recording(expected.file))).summary;
    const lines = recording(expected.file).toString('latin1').trimEnd().split('\r\n');
    for (const ending of ['\n', '\r'])
      expect((await analysed(technician, lines.join(ending) + ending)).summary).toEqual(whole);
    // Pairs of an instant stay together; the second half comes first.
    const half = Math.floor(lines.length / 4) * 2 + (lines[0]!.startsWith('#') ? 1 : 0);
    const turned = [...lines.slice(half), ...lines.slice(0, half)].join('\r\n');
    const { totals, epochs } = (await analysed(technician, `${turned}\r\n`)).summary!;
    expect({ totals, epochs }).toEqual({ totals: whole!.totals, epochs: whole!.epochs });
  });
});

it('counts an instant once, and says what else came for it', async () => {
  const log = await analysed(
    await server.as('technician'),
    dated(noon, 4) + gga(noon, 5, { talker: 'GP' }) + dated(noon + 1000, 4) + seconds(0, 2, 5),
  );
  expect(log.summary).toMatchObject({ ggaSentences: 5, epochs: 2, duplicates: 3, transitions: [] });
});

it('explains its losses by the rules of the board', async () => {
  const text =
    seconds(0, 120, 4) +
    // Age rises second by second while reports go on, then the fix goes; corrections come again.
    seconds(120, 240, 5, (second) => ({ ageSeconds: second - 119 })) +
    seconds(240, 300, 4) +
    // A blocked sky: half the satellites, corrections good.
    seconds(300, 360, 5, () => ({ satellites: 5, hdop: 4.1 })) +
    seconds(360, 400, 4) +
    // Nothing heard, and back.
    seconds(500, 540, 4);
  const { detail, summary } = await analysed(await server.as('technician'), text);
  const at = (second: number) => new Date(noon + second * 1000).toISOString();
  expect(detail!.losses).toMatchObject([
    { start: at(120), end: at(240), cause: 'correctionsStopped' },
    { start: at(300), end: at(360), cause: 'skyBlocked' },
    { start: at(409), end: at(500), cause: 'wentQuiet' },
  ]);
  expect(detail!.losses[0]!.evidence.join()).toMatch(/age of corrections rose to \d+ s/);
  expect(detail!.losses[1]!.evidence.join()).toContain('satellites 22 \u2192 5');
  expect(summary!.maxAgeSeconds).toBe(120);
});

describe('the day', () => {
  const timeOnly = gga(noon, 4) + gga(noon + 1000, 4);

  it('is the one that was given', async () => {
    const { summary, detail } = await analysed(await server.as('technician'), timeOnly, {
      date: '2026-10-07',
      roverId: '',
    });
    expect([summary!.firstTime, detail!.dateFrom]).toEqual(['2026-10-07T12:00:00.000Z', 'given']);
    const against = await analysed(await server.as('technician'), seconds(0, 3, 4), { date: '2026-10-01' });
    expect(against.summary!.firstTime).toBe('2026-10-01T12:00:00.000Z');
    expect(against.detail!.notes).toEqual(['The sentences say 2026-10-07; the date that was given counts.']);
  });

  it('without any, is taken from the arrival of the file, and that is said', async () => {
    server.clock.set(Date.UTC(2026, 9, 8, 7, 30));
    const technician = await server.as('technician');
    const { summary, detail } = await analysed(technician, timeOnly);
    // A file holds the past: noon of the day before, not of today.
    expect([summary!.firstTime, detail!.dateFrom]).toEqual(['2026-10-07T12:00:00.000Z', 'arrival']);
    expect(detail!.notes).toEqual([expect.stringContaining('The sentences have no date')]);
    const overnight = Array.from({ length: 40 }, (_, hour) => gga(noon - (39 - hour) * 3_600_000, 4)).join(
      '',
    );
    const long = await analysed(technician, overnight);
    expect([long.summary!.firstTime, long.summary!.lastTime]).toEqual([
      '2026-10-05T21:00:00.000Z',
      '2026-10-07T12:00:00.000Z',
    ]);
    server.clock.run();
  });

  it('counts from the first date in it, however late that comes', async () => {
    const text = Array.from({ length: 20_000 }, (_, index) => gga(noon + index * 10_000, 4)).join('');
    const last = noon + 19_999 * 10_000;
    const { summary } = await analysed(
      await server.as('technician'),
      text + writeRmc({ time: last, latitude: 1, longitude: 1 }),
    );
    expect([summary!.firstTime, summary!.lastTime, summary!.epochs]).toEqual([
      new Date(noon).toISOString(),
      new Date(last).toISOString(),
      20_000,
    ]);
  });
});

it('lists the newest fifty without their changes, and removes one with all that was read of it', async () => {
  const technician = await server.as('technician');
  const { id } = await analysed(technician, recording(published.walk.file));
  const { logs } = await technician.json<{ logs: Log[] }>('GET', '/api/logs');
  expect(logs[0]).toMatchObject({ id, name: 'day.nmea', by: 'technician', status: 'done' });
  expect(logs[0]!.summary).toMatchObject({ epochs: 536, transitions: [], moreTransitions: 3 });
  await technician.json('DELETE', `/api/logs/${id}`);
  expect((await technician.call('GET', `/api/logs/${id}`)).status).toBe(404);
  expect((await technician.call('DELETE', `/api/logs/${id}`)).status).toBe(404);
  const audit = await (
    await server.as('manager')
  ).json<{ entries?: { action: string }[] }>('GET', '/api/audit');
  expect(JSON.stringify(audit)).toContain('log.removed');
});

it('is bounded where the state changes without end', async () => {
  const chatter = Array.from({ length: 60_000 }, (_, index) => dated(noon + index * 1000, 4 + (index % 2)));
  const { summary, detail }: LogWithDetail = await analysed(await server.as('technician'), chatter.join(''));
  expect(summary!.transitions).toHaveLength(2000);
  expect(summary!.moreTransitions).toBe(59_998 - 2000);
  expect(summary!.totals).toMatchObject({ fixedMs: 30_000_000, floatMs: 29_999_000 });
  expect(detail!.spans.length).toBeLessThanOrEqual(2000);
  expect(detail!.points.length).toBeLessThanOrEqual(1200);
  expect(detail!.points.length).toBeGreaterThan(500);
  const drawn = detail!.spans;
  expect([drawn[0]!.start, drawn.at(-1)!.end]).toEqual([noon, noon + 59_999_000]);
  expect(drawn.every(({ start }, index) => index === 0 || start === drawn[index - 1]!.end)).toBe(true);
  expect(detail!.notes).toEqual(['The state changes too often in it to tell losses apart.']);
});
