import type { Socket } from 'node:net';
import { Duplex } from 'node:stream';
import { RtcmFrameReader } from '@hubtack/contracts/rtcm/frame-reader.js';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { demoMountPoints } from './demo-mount-points.js';
import type { MountPointOptions } from './mount-point.js';
import { CasterStream } from './stream.js';

beforeEach(() => vi.useFakeTimers());
afterEach(() => vi.useRealTimers());

const well: MountPointOptions = { name: 'WELL', stream: { kind: 'msm' }, latitude: -41.5, longitude: 147.25 };
const options = { isChunked: false, isCompressed: false, seed: 1, secondMs: 1000, startAt: 0 };

/** A connection whose other end takes what is sent, or never does. */
function connection(takes: boolean) {
  const sent: Buffer[] = [];
  const write = (chunk: Buffer, _encoding: string, done: () => void) => {
    sent.push(chunk);
    if (takes) done();
  };
  return { socket: new Duplex({ read: () => undefined, write }) as Socket, sent };
}

function numbersIn(sent: readonly Buffer[]): number[] {
  const numbers: number[] = [];
  const reader = new RtcmFrameReader({ frame: (_payload, number) => numbers.push(number) });
  for (const chunk of sent) reader.push(chunk);
  return numbers;
}

it('lets a client go that takes nothing, before much waits for it, and then stands still', () => {
  const { socket } = connection(false);
  new CasterStream(socket, well, options);
  let most = 0;
  for (let second = 0; second < 3600 && !socket.destroyed; second++) {
    vi.advanceTimersByTime(1000);
    most = Math.max(most, socket.writableLength);
  }
  expect(socket.destroyed).toBe(true);
  expect(most).toBeLessThan(1_100_000);
});
it('has no timer left when the connection has ended', async () => {
  const { socket } = connection(true);
  new CasterStream(socket, well, options);
  expect(vi.getTimerCount()).toBe(1);
  const closed = new Promise((resolve) => {
    socket.once('close', resolve);
  });
  socket.destroy();
  await closed;
  expect(vi.getTimerCount()).toBe(0);
});
it('stalls after so many bytes, in the middle of a frame, and keeps the connection', () => {
  const { socket, sent } = connection(true);
  new CasterStream(socket, { ...well, faults: { stallAfterBytes: 500 } }, options);
  vi.advanceTimersByTime(60_000);
  expect(Buffer.concat(sent)).toHaveLength(500);
  expect(socket.destroyed).toBe(false);
});
it('waits for a position when it is told to, though it is no network', () => {
  const { socket, sent } = connection(true);
  const stream = new CasterStream(socket, { ...well, faults: { waitsForPosition: true } }, options);
  vi.advanceTimersByTime(5000);
  expect(sent).toEqual([]);
  // A rover without a position says nothing of use.
  stream.locate('$GPGGA,000000,,,,,0,00,,,M,,M,,*66');
  vi.advanceTimersByTime(5000);
  expect(sent).toEqual([]);
  stream.locate('$GPGGA,123519,4807.038,N,01131.000,E,1,08,0.9,545.4,M,46.9,M,,*47');
  expect(numbersIn(sent)).toHaveLength(6);
});
it('sends the station message every so many seconds', () => {
  const { socket, sent } = connection(true);
  new CasterStream(socket, { ...well, stationEverySeconds: 10, antennaHeightM: 1.5 }, options);
  vi.advanceTimersByTime(29_000);
  const numbers = numbersIn(sent);
  expect(numbers.filter((number) => number === 1006)).toHaveLength(3);
  expect(numbers.filter((number) => number === 1077)).toHaveLength(30);
});
it('plays a recording over and over, at six frames a second', () => {
  const { socket, sent } = connection(true);
  const record = demoMountPoints().find(({ name }) => name === 'RECORD')!;
  new CasterStream(socket, record, options);
  vi.advanceTimersByTime(59_000);
  const numbers = numbersIn(sent);
  expect(numbers).toHaveLength(360);
  expect(numbers.slice(127, 254)).toEqual(numbers.slice(0, 127));
});
