import { connect } from 'node:net';
import { gunzipSync } from 'node:zlib';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { writeGga } from '@hubtack/contracts/nmea/sentence-writer.js';
import { RtcmFrameReader } from '@hubtack/contracts/rtcm/frame-reader.js';
import { readStation, type Station } from '@hubtack/contracts/rtcm/station.js';
import { geodeticOf } from '@hubtack/contracts/geodesy/ecef.js';
import { startCaster, type Caster } from './caster.js';
import { casterFaults, streamFaults } from './fault-words.js';

let caster: Caster | null = null;
afterEach(async () => {
  await caster?.close();
  caster = null;
  vi.useRealTimers();
});
const login = { user: 'pennywort', password: 'words' };
const base = { stream: { kind: 'msm' }, latitude: -41.5, longitude: 147.25 } as const;
const start = async () => {
  caster = await startCaster({
    mountPoints: [
      { ...base, name: 'TANF00', heightM: 12.5, stationId: 7, login },
      { ...base, name: 'NET', isNetwork: true },
      { ...base, name: 'WELL' },
    ],
    secondMs: 5,
  });
  return caster;
};

/** Says something and reads until the bytes are enough, or the end. */
function say(text: string, isEnough: (bytes: Buffer) => boolean = () => false): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    let bytes = Buffer.alloc(0);
    const socket = connect(caster!.port, '127.0.0.1', () => socket.write(text));
    const done = () => {
      socket.destroy();
      resolve(bytes);
    };
    socket.on('data', (chunk: Buffer) => {
      bytes = Buffer.concat([bytes, chunk]);
      if (isEnough(bytes)) done();
    });
    socket.once('error', reject);
    socket.once('end', done);
  });
}
const ask = (lines: string[], isEnough?: (bytes: Buffer) => boolean) =>
  say(`${lines.join('\r\n')}\r\n\r\n`, isEnough);

/** Frames, wrong ones and bytes outside, in what a version 1 caster sent. */
function framesIn(bytes: Buffer) {
  const found = { numbers: [] as number[], stations: [] as Station[], bad: 0, outside: 0 };
  const reader = new RtcmFrameReader({
    frame: (payload, number) => {
      found.numbers.push(number);
      const station = readStation(payload);
      if (station) found.stations.push(station);
    },
    badCrc: () => found.bad++,
    noise: (count) => (found.outside += count),
  });
  reader.push(bytes.subarray('ICY 200 OK\r\n\r\n'.length));
  const { outside } = found;
  // What is left of a frame that is not whole counts as outside at the end.
  reader.end();
  return { ...found, outside, left: found.outside - outside };
}
const basic = `Authorization: Basic ${btoa('pennywort:words')}`;

describe('a caster', () => {
  it('shows its table to version 1 and 2, and for a mount point that it has not', async () => {
    await start();
    const table = (await ask(['GET / HTTP/1.0', 'User-Agent: NTRIP test'])).toString();
    expect(table).toMatch(/^SOURCETABLE 200 OK\r\n/);
    expect(table).toMatch(/\r\nSTR;TANF00;TANF00;RTCM 3\.3;1005\(1\),.*;-41\.50;147\.25;0;0;.*;B;N;/);
    expect(table).toMatch(/\r\nENDSOURCETABLE\r\n$/);
    const second = (await ask(['GET /TANF0O HTTP/1.1', 'Ntrip-Version: Ntrip/2.0'])).toString();
    expect(second).toMatch(/^HTTP\/1\.1 200 OK\r\n.*Content-Type: gnss\/sourcetable/s);
    expect(caster!.requests.map(({ outcome }) => outcome)).toEqual(['table', 'table']);
  });
  it('refuses a wrong login, and sends frames of the base with a right one', async () => {
    await start();
    for (const wrong of ['pennywort:word', 'pennyworth:words', 'pennywort', ':words']) {
      const refused = (await ask(['GET /TANF00 HTTP/1.0', `Authorization: Basic ${btoa(wrong)}`])).toString();
      expect(refused).toMatch(/^HTTP\/1\.1 401 .*WWW-Authenticate: Basic realm="TANF00"/s);
    }
    expect((await ask(['GET /TANF00 HTTP/1.0'])).toString()).toMatch(/^HTTP\/1\.1 401 /);
    const bytes = await ask(['GET /TANF00 HTTP/1.0', basic], ({ length }) => length > 3000);
    expect(bytes.toString('latin1')).toMatch(/^ICY 200 OK\r\n\r\n/);
    const { numbers, stations } = framesIn(bytes);
    expect(numbers.slice(0, 6)).toEqual([1005, 1077, 1087, 1097, 1127, 1230]);
    expect(stations[0]).toMatchObject({ stationId: 7, isVirtual: false });
    expect(geodeticOf(stations[0]!)).toEqual({
      latitude: expect.closeTo(-41.5, 8),
      longitude: expect.closeTo(147.25, 8),
      heightM: expect.closeTo(12.5, 3),
    });
    expect(caster!.requests.map(({ user, outcome }) => [user, outcome])).toEqual([
      ['pennywort', 'refused'],
      ['pennyworth', 'refused'],
      ['pennywort', 'refused'],
      ['', 'refused'],
      [null, 'refused'],
      ['pennywort', 'stream'],
    ]);
    expect(JSON.stringify(caster!.requests)).not.toContain('words');
  });
  it('sends the same bytes for the same seed and instant', async () => {
    const sent = ({ length }: Buffer) => length > 3000;
    const take = async () => {
      await start();
      const bytes = await ask(['GET /TANF00 HTTP/1.0', basic], sent);
      await caster!.close();
      return bytes.subarray(0, 3000);
    };
    vi.useFakeTimers({ toFake: ['Date'] });
    const first = await take();
    expect(await take()).toEqual(first);
  });
  it('of a network sends nothing before it knows where the rover is', async () => {
    await start();
    const sentence = writeGga({
      time: Date.parse('2026-12-02T00:00:00Z'),
      latitude: -41.44,
      longitude: 147.14,
      quality: 1,
      satellites: 12,
      hdop: 1,
      altitudeM: 0,
      geoidSeparationM: 0,
      ageSeconds: null,
      stationId: null,
    }).trim();
    const bytes = await ask(
      ['GET /NET HTTP/1.1', 'Ntrip-Version: Ntrip/2.0', `Ntrip-GGA: ${sentence}`],
      ({ length }) => length > 1500,
    );
    expect(bytes.toString('latin1')).toContain('Transfer-Encoding: chunked');
    expect(caster!.requests[0]!.positions).toEqual([sentence]);
  });
  it('can be told to break off in the middle of a frame', async () => {
    await start();
    caster!.setFaults('TANF00', streamFaults('cut'));
    const { numbers, outside, left } = framesIn(await ask(['GET /TANF00 HTTP/1.0', basic]));
    expect(numbers).toHaveLength(20);
    expect(outside).toBe(0);
    expect(left).toBeGreaterThan(3);
  });
  it('damages every third frame, with garbage before each, while it runs and not after', async () => {
    await start();
    caster!.setFaults('WELL', streamFaults('badCrc:3,garbage:10'));
    const bytes = await ask(['GET /WELL HTTP/1.0'], ({ length }) => length > 8000);
    const { numbers, bad, outside } = framesIn(bytes);
    expect(bad).toBeGreaterThanOrEqual(Math.floor(numbers.length / 2) - 1);
    expect(outside).toBeGreaterThan(numbers.length * 10);
    caster!.setFaults('WELL', {});
    const well = framesIn(await ask(['GET /WELL HTTP/1.0'], ({ length }) => length > 8000));
    expect([well.bad, well.outside]).toEqual([0, 0]);
  });
  it('moves its base, and gives it another id', async () => {
    await start();
    const stationsOf = async () =>
      framesIn(await ask(['GET /WELL HTTP/1.0'], ({ length }) => length > 1500)).stations[0]!;
    const before = await stationsOf();
    caster!.setFaults('WELL', streamFaults('moved:3,otherStation:55'));
    const after = await stationsOf();
    expect(Math.hypot(after.x - before.x, after.y - before.y, after.z - before.z)).toBeCloseTo(3, 1);
    expect([before.stationId, after.stationId]).toEqual([1, 55]);
  });
  it('compresses its table in version 2 when told to, and has more headers', async () => {
    await start();
    caster!.faults = casterFaults('gzip,moreHeaders');
    const bytes = await ask(['GET / HTTP/1.1', 'Ntrip-Version: Ntrip/2.0']);
    const body = bytes.indexOf('\r\n\r\n') + 4;
    expect(bytes.subarray(0, body).toString()).toMatch(/Content-Encoding: gzip\r\n.*X-Note: a colon: and/s);
    expect(gunzipSync(bytes.subarray(body)).toString()).toContain('STR;TANF00;');
  });
  it('writes odd records beside the good ones', async () => {
    await start();
    caster!.faults = casterFaults('oddTable,noTableEnd');
    const table = (await ask(['GET / HTTP/1.0'])).toString();
    expect(table).toContain(';357.85;');
    expect(table).toContain(';0.00;0.00;');
    expect(table).toContain('STR;UTF800;Brücke');
    expect(table).not.toContain('ENDSOURCETABLE');
  });
  it('is not brought down by what clients say', async () => {
    await start();
    for (const nonsense of ['GET /%E0%A4%A HTTP/1.0\r\n\r\n', 'x'.repeat(20_000), '\r\n\r\n'])
      expect((await say(nonsense)).toString()).toMatch(/^HTTP\/1\.1 400 /);
    expect((await ask(['POST /TANF00 HTTP/1.1'])).toString()).toMatch(/^HTTP\/1\.1 405 /);
    const login = Buffer.from('vermessung-süd:橋').toString('base64');
    const refused = await ask(['GET /TANF00 HTTP/1.0', `Authorization: Basic ${login}`]);
    expect(refused.toString()).toMatch(/^HTTP\/1\.1 401 /);
    expect(caster!.requests.at(-1)!.user).toBe('vermessung-süd');
    expect((await ask(['GET / HTTP/1.0'])).toString()).toContain('ENDSOURCETABLE');
  });
});
it('a fault that does not exist is said', () => {
  expect(() => streamFaults('cut,nonsense')).toThrow('there is no fault nonsense');
  expect(() => streamFaults('constructor')).toThrow('there is no fault constructor');
  expect(() => casterFaults('cut')).toThrow('there is no fault cut');
  expect(streamFaults('moved,badCrc:5')).toEqual({ movedNorthM: 1.5, badCrcEvery: 5 });
});
