import { readdirSync, readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';
import type { CorrectionCheck } from '@hubtack/contracts/corrections/check.js';
import type { CorrectionSource } from '@hubtack/contracts/corrections/correction-source.js';
import { startCaster, type Caster } from '@hubtack/simulators/caster/caster.js';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { Client } from '../harness/client.js';
import { ServerProcess } from '../harness/server-process.js';
import { until } from '../harness/until.js';

const login = { user: 'tannery', password: 'plumb-bob-9081' };
let server: ServerProcess;
let caster: Caster;
beforeAll(async () => {
  caster = await startCaster({
    secondMs: 40,
    mountPoints: [
      { name: 'TANF00', stream: { kind: 'msm' }, latitude: -41.5, longitude: 147.25, login },
      { name: 'QUARB2', stream: { kind: 'msm' }, latitude: -41.4, longitude: 147.25, login },
    ],
  });
  server = await ServerProcess.make({ CASTER_PRIVATE_ADDRESSES: 'allow', LOG_LEVEL: 'trace' });
  server.logFile = join(server.folder, 'server.log');
  await server.start();
});
afterAll(async () => {
  await server.remove();
  await caster.close();
});

/** Every file of the server: database, its log of pages, uploads, and everything that it has logged. */
function* files(folder: string): Generator<string> {
  for (const name of readdirSync(folder)) {
    const path = join(folder, name);
    if (statSync(path).isDirectory()) yield* files(path);
    else yield path;
  }
}

it('a password that was typed, changed, refused and used stands in no file of the server, whatever the log level', async () => {
  const technician = new Client(server.url);
  await technician.signIn('technician@pennywort.example', 'tack-in-the-hub');
  const body = {
    name: 'Secret base',
    address: '127.0.0.1',
    port: caster.port,
    mountPoint: 'TANF00',
    ...login,
    password: 'mistyped-bob-9081',
  };
  const { id } = await technician.json<CorrectionSource>('POST', '/api/correction-sources', body);
  const check = async (): Promise<CorrectionCheck> => {
    const path = `/api/correction-sources/${id}/checks`;
    const begun = await technician.json<CorrectionCheck>('POST', path, {});
    return until(async () => {
      const now = await technician.json<CorrectionCheck>('GET', `${path}/${begun.id}`);
      if (now.status === 'running') throw new Error('it still runs');
      return now;
    }, 60_000);
  };
  expect(await check()).toMatchObject({ failedStep: 'login' });
  await technician.json('PUT', `/api/correction-sources/${id}`, { ...body, ...login });
  // Bad requests are where bodies like to end up in logs.
  await technician.call('POST', '/api/correction-sources', { ...body, ...login, port: 'x' });
  await technician.json('GET', `/api/correction-sources/${id}/mount-points`);
  expect(await check()).toMatchObject({ passed: true });
  await technician.json('GET', '/api/correction-sources');

  const found = [...files(server.folder)].map(
    (path) => [path, readFileSync(path).toString('latin1')] as const,
  );
  expect(found.map(([path]) => path)).toContain(server.logFile);
  const log = found.find(([path]) => path === server.logFile)![1];
  expect(log).toContain('/api/correction-sources');
  for (const password of [login.password, body.password])
    for (const form of [password, btoa(`${login.user}:${password}`), encodeURIComponent(password)])
      for (const [path, text] of found) expect(text.includes(form), `${form} in ${path}`).toBe(false);
});
