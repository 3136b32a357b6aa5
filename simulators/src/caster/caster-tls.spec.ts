import { execFileSync, spawnSync } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { connect as connectPlain } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { connect } from 'node:tls';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { startCaster, type Caster } from './caster.js';

const hasOpenssl = spawnSync('openssl', ['version']).status === 0;

describe.skipIf(!hasOpenssl)('a caster that speaks TLS', () => {
  let folder: string;
  let tls: { key: string; cert: string };
  let caster: Caster;
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), 'hubtack-tls-'));
    const [key, cert] = [join(folder, 'key.pem'), join(folder, 'cert.pem')];
    const kind = ['-x509', '-newkey', 'ec', '-pkeyopt', 'ec_paramgen_curve:prime256v1', '-nodes'];
    const name = ['-subj', '/CN=localhost', '-addext', 'subjectAltName=DNS:localhost', '-days', '2'];
    execFileSync('openssl', ['req', ...kind, ...name, '-keyout', key, '-out', cert], { stdio: 'ignore' });
    tls = { key: readFileSync(key, 'utf8'), cert: readFileSync(cert, 'utf8') };
  });
  afterAll(() => rmSync(folder, { recursive: true }));
  beforeEach(async () => {
    const well = { name: 'WELL', stream: { kind: 'msm' }, latitude: -41.5, longitude: 147.25 } as const;
    caster = await startCaster({ mountPoints: [well], tls });
  });
  afterEach(() => caster.close());

  it('answers whoever trusts its certificate, and nobody else is fooled', async () => {
    const trusting = connect({ port: caster.port, host: '127.0.0.1', servername: 'localhost', ca: tls.cert });
    await once(trusting, 'secureConnect');
    trusting.write('GET /WELL HTTP/1.0\r\n\r\n');
    const [first] = (await once(trusting, 'data')) as [Buffer];
    expect(first.toString('latin1')).toMatch(/^ICY 200 OK/);
    trusting.destroy();
    const wary = connect({ port: caster.port, host: '127.0.0.1', servername: 'localhost' });
    const [error] = (await once(wary, 'error')) as [NodeJS.ErrnoException];
    expect(error.code).toBe('DEPTH_ZERO_SELF_SIGNED_CERT');
  });
  it('is not brought down by a client that speaks none, and ends though one has agreed on nothing', async () => {
    const plain = connectPlain(caster.port, '127.0.0.1');
    plain.on('error', () => undefined);
    plain.write('GET /WELL HTTP/1.0\r\n\r\n');
    await once(plain.resume(), 'close');
    const silent = connectPlain(caster.port, '127.0.0.1');
    await once(silent, 'connect');
    const gone = once(silent.resume(), 'close');
    await caster.close();
    await gone;
    expect(caster.requests).toEqual([]);
    caster = await startCaster({ mountPoints: [] });
  });
});
