import { spawn, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { geodeticOf } from '@hubtack/contracts/geodesy/ecef.js';
import { RtcmFrameReader } from '@hubtack/contracts/rtcm/frame-reader.js';
import { readStation, type Station } from '@hubtack/contracts/rtcm/station.js';
import { startCaster, type Caster } from '@hubtack/simulators/caster/caster.js';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { until } from '../harness/until.js';
import { fromRoot } from '../harness/root.js';

/** `str2str` of Debian's rtklib package, as a client that others wrote. Without it there is nothing to compare with. */
const isThere = spawnSync('str2str', ['-h']).error === undefined;

describe.skipIf(!isThere)('str2str as a client of the caster', () => {
  const login = { user: 'pennywort', password: 'field-book' };
  const base = { stream: { kind: 'msm' }, latitude: -41.5, longitude: 147.25, heightM: 12.5 } as const;
  const recording = readFileSync(fromRoot('simulators/recordings/aamakinen.rtcm3'));
  let caster: Caster;
  let folder: string;
  beforeAll(async () => {
    caster = await startCaster({
      mountPoints: [
        { ...base, name: 'TANF00', stationId: 7, antennaHeightM: 1.25, login },
        { ...base, name: 'TASNET', isNetwork: true },
        { ...base, name: 'RECORD', stream: { kind: 'recording', bytes: recording } },
      ],
      secondMs: 20,
    });
  });
  beforeEach(() => {
    folder = mkdtempSync(join(tmpdir(), 'hubtack-str2str-'));
    caster.requests.length = 0;
  });
  afterEach(() => rmSync(folder, { recursive: true }));
  afterAll(() => caster.close());

  const outcome = () => caster.requests.at(-1)?.outcome;

  /** Runs str2str until the caster has done what is waited for; answers what it wrote. */
  async function run(
    from: string,
    isDone: (written: number) => boolean,
    more: string[] = [],
  ): Promise<Buffer> {
    const file = join(folder, 'out.rtcm3');
    const input = `ntrip://${from.replace('@', `@127.0.0.1:${caster.port}/`)}`;
    const child = spawn('str2str', ['-in', input, '-out', `file://${file}`, ...more], { stdio: 'ignore' });
    const ended = new Promise((resolve) => {
      child.once('exit', resolve);
    });
    const written = () => statSync(file, { throwIfNoEntry: false })?.size ?? 0;
    try {
      await until(() => expect(isDone(written())).toBe(true));
    } finally {
      // It forgets an interrupt that comes while it starts.
      child.kill('SIGKILL');
      await ended;
    }
    return written() === 0 ? Buffer.alloc(0) : readFileSync(file);
  }
  const framesIn = (bytes: Buffer) => {
    const found = { numbers: [] as number[], station: null as Station | null, bad: 0 };
    const reader = new RtcmFrameReader({
      frame: (payload, number) => {
        found.numbers.push(number);
        found.station ??= readStation(payload);
      },
      badCrc: () => found.bad++,
    });
    reader.push(bytes);
    return found;
  };

  it('with the right login gets the frames as they were sent', async () => {
    const { numbers, station, bad } = framesIn(
      await run(`${login.user}:${login.password}@TANF00`, (size) => size > 2000),
    );
    expect(numbers.slice(0, 6)).toEqual([1006, 1077, 1087, 1097, 1127, 1230]);
    expect(bad).toBe(0);
    expect(station).toMatchObject({ stationId: 7, antennaHeightM: 1.25 });
    expect(geodeticOf(station!).latitude).toBeCloseTo(-41.5, 8);
  });
  it('gets the recording byte for byte', async () => {
    const bytes = await run(':@RECORD', (size) => size > recording.length + 2);
    // str2str hands on the blank line behind ICY as well.
    const start = bytes.indexOf(0xd3);
    expect(bytes.subarray(start, start + recording.length)).toEqual(recording);
  });
  it('with a wrong login gets nothing', async () => {
    const bytes = await run(`${login.user}:wrong@TANF00`, () => outcome() === 'refused');
    expect(bytes).toHaveLength(0);
  });
  it('that asks for a mount point which is not there gets the table, and no data', async () => {
    const bytes = await run(`${login.user}:${login.password}@TANF0O`, () => outcome() === 'table');
    expect(framesIn(bytes).numbers).toEqual([]);
  });
  it('gets a virtual base once it has said where it is', async () => {
    const where = ['-p', '-41.44', '147.14', '10', '-n', '200'];
    const { station } = framesIn(await run(':@TASNET', (size) => size > 2000, where));
    expect(caster.requests.at(-1)!.positions[0]).toMatch(/^\$G[NP]GGA,/);
    expect(station!.isVirtual).toBe(true);
    const place = geodeticOf(station!);
    expect([place.latitude, place.longitude]).toEqual([expect.closeTo(-41.44, 6), expect.closeTo(147.14, 6)]);
  });
});
