import { connect } from 'node:net';
import { afterEach, describe, expect, it } from 'vitest';
import { writeGga } from '@hubtack/contracts/nmea/sentence-writer.js';
import { RtcmFrameReader } from '@hubtack/contracts/rtcm/frame-reader.js';
import { readStation } from '@hubtack/contracts/rtcm/station.js';
import { geodeticOf } from '@hubtack/contracts/geodesy/ecef.js';
import { startCaster, type Caster } from './caster.js';
import { streamFaults } from './fault-words.js';

let caster: Caster | null = null;
afterEach(async () => {
  await caster?.close();
  caster = null;
});
const login = { user: 'pennywort', password: 'words' };
const base = { stream: { kind: 'msm' }, latitude: -41.5, longitude: 147.25 } as const;
const start = async () => {
  caster = await startCaster({
    mountPoints: [
      { ...base, name: 'TANF00', heightM: 12.5, stationId: 7, login },
      { ...base, name: 'NET', isNetwork: true },
    ],
    secondMs: 5,
  });
  return caster;
};

/** Sends a request and reads until the bytes are enough, or the end. */
function ask(lines: string[], isEnough: (bytes: Buffer) => boolean = () => false): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    let bytes = Buffer.alloc(0);
    const socket = connect(caster!.port, '127.0.0.1', () => socket.write(`${lines.join('\r\n')}\r\n\r\n`));
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
    const refused = (await ask(['GET /TANF00 HTTP/1.0', 'Authorization: Basic abc'])).toString();
    expect(refused).toMatch(/^HTTP\/1\.1 401 .*WWW-Authenticate: Basic realm="TANF00"/s);
    const bytes = await ask(['GET /TANF00 HTTP/1.0', basic], ({ length }) => length > 3000);
    expect(bytes.toString('latin1')).toMatch(/^ICY 200 OK\r\n\r\n/);
    const numbers = new Set<number>();
    let place = null;
    const reader = new RtcmFrameReader({
      frame: (payload, number) => {
        numbers.add(number);
        const station = readStation(payload);
        if (station) place = { ...geodeticOf(station), id: station.stationId };
      },
    });
    reader.push(bytes.subarray(14));
    expect([...numbers].toSorted((a, b) => a - b)).toEqual([1005, 1077, 1087, 1097, 1127, 1230]);
    expect(place).toEqual({
      latitude: expect.closeTo(-41.5, 8),
      longitude: expect.closeTo(147.25, 8),
      heightM: expect.closeTo(12.5, 3),
      id: 7,
    });
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
    const bytes = await ask(['GET /TANF00 HTTP/1.0', basic]);
    let frames = 0;
    const reader = new RtcmFrameReader({ frame: () => frames++ });
    reader.push(bytes);
    reader.end();
    expect(frames).toBe(20);
  });
});
it('a fault that does not exist is said', () => {
  expect(() => streamFaults('cut,nonsense')).toThrow('there is no fault nonsense');
  expect(streamFaults('moved,badCrc')).toEqual({ movedNorthM: 1.5, badCrcEvery: 3 });
});
