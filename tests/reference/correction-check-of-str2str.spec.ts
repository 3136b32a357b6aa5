import { spawn, spawnSync, type ChildProcess } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { connect, createServer, type AddressInfo, type Server, type Socket } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { freePorts } from '../bench/free-ports.js';
import { checkSource } from '../harness/check-source.js';
import { fromRoot } from '../harness/root.js';
import { until } from '../harness/until.js';

/** `str2str` of Debian's rtklib package, as a caster that others wrote. */
const isThere = spawnSync('str2str', ['-h']).error === undefined;
const recording = readFileSync(fromRoot('simulators/recordings/aamakinen.rtcm3'));
/** Bytes of the recording for a tenth of a second of it: it lasts about 20 s. */
const PIECE = Math.ceil(recording.length / 200);

describe.skipIf(!isThere)('the check of a mount point of str2str', () => {
  let feed: Server;
  let child: ChildProcess;
  let port: number;
  const sockets = new Set<Socket>();
  beforeAll(async () => {
    // The base: its recording over and over, at about twice its pace.
    feed = createServer((socket) => {
      sockets.add(socket);
      let at = 0;
      const timer = setInterval(() => {
        socket.write(recording.subarray(at, at + PIECE));
        at = at + PIECE >= recording.length ? 0 : at + PIECE;
      }, 50);
      socket.on('error', () => socket.destroy());
      socket.once('close', () => clearInterval(timer));
    });
    await new Promise<void>((resolve) => {
      feed.listen(0, '127.0.0.1', resolve);
    });
    [port] = (await freePorts(1)) as [number];
    const table = 'AAMA;RTCM 3.3;1005(1),1077(1);2;GPS+GLO+GAL+BDS;NET;FIN;63.36;23.36;0;0;s;none;B;N;7200;';
    child = spawn(
      'str2str',
      [
        '-in',
        `tcpcli://127.0.0.1:${(feed.address() as AddressInfo).port}`,
        '-out',
        `ntripc://pennywort:field-book@:${port}/AAMA:${table}`,
      ],
      { stdio: 'ignore' },
    );
    await until(
      () =>
        new Promise<void>((resolve, reject) => {
          const probe = connect(port, '127.0.0.1', () => {
            probe.destroy();
            resolve();
          });
          probe.once('error', reject);
        }),
    );
    await until(() => expect(sockets.size).toBeGreaterThan(0));
  });
  afterAll(async () => {
    const ended = new Promise((resolve) => {
      child.once('exit', resolve);
    });
    child.kill('SIGKILL');
    await ended;
    for (const socket of sockets) socket.destroy();
    feed.close();
  });

  const check = (change: Partial<Parameters<typeof checkSource>[0]> = {}) =>
    checkSource({ port, mountPoint: 'AAMA', ntripVersion: 1, ...change });

  it('with the right login passes, and finds the recorded base', async () => {
    const { failed, report, step } = await check();
    expect(failed, JSON.stringify(report.steps)).toBeNull();
    expect(step('login').seen).toBe('The login is accepted.');
    // simulators/recordings/README.md.
    expect(report.base).toMatchObject({
      stationId: 0,
      latitude: expect.closeTo(63.35665315, 7),
      longitude: expect.closeTo(23.35591775, 7),
      heightM: expect.closeTo(93.761, 3),
    });
    expect(report.stream!.messages.map(({ number }) => number)).toEqual(
      expect.arrayContaining([1005, 1077, 1084]),
    );
  });
  it('with a wrong password fails at the login', async () => {
    expect((await check({ password: 'field-boook' })).failed).toBe('login');
  });
  it('of an unknown name fails at the mount point, with the right one suggested', async () => {
    const { failed, report } = await check({ mountPoint: 'AMAA' });
    expect(failed).toBe('mountPoint');
    expect(report.spellings[0]?.mountPoint).toBe('AAMA');
  });
  it('asked in version 2 is the same', async () => {
    expect((await check({ ntripVersion: 2 })).failed).toBeNull();
  });
});
