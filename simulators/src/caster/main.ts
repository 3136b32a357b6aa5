import { readFileSync } from 'node:fs';
import { z } from 'zod';
import { readOptions, stopWith } from '../cli/options.js';
import { startCaster } from './caster.js';
import { demoMountPoints } from './demo-mount-points.js';
import { casterFaults, faultNames, streamFaults } from './fault-words.js';

const usage = `A local NTRIP caster, versions 1 and 2, with the demo firm's mount points and faults on demand.

  npm run caster -- [--port 2101] [--host 127.0.0.1] [--seed N] [--key FILE --cert FILE]
                    [--fault MOUNT=FAULT[,FAULT...]]... [--caster-fault FAULT[,FAULT...]]

--key and --cert: PEM files; the caster then speaks TLS.
Faults of a mount point: ${faultNames.ofStreams.join(', ')}.
Faults of the caster: ${faultNames.ofCaster.join(', ')}.
Some take a number: --fault TANF00=moved:2.5,garbage:100
The login is pennywort, the password field-book-2026; RECORD plays a recorded base and needs none.`;

const options = readOptions(
  usage,
  {
    port: { type: 'string' },
    host: { type: 'string' },
    seed: { type: 'string' },
    key: { type: 'string' },
    cert: { type: 'string' },
    fault: { type: 'string', multiple: true },
    'caster-fault': { type: 'string' },
  },
  z.object({
    port: z.coerce.number().int().min(0).max(65_535).default(2101),
    host: z.string().default('127.0.0.1'),
    seed: z.coerce.number().int().min(0).default(1),
    key: z.string().optional(),
    cert: z.string().optional(),
    fault: z.array(z.string().regex(/^[^=]+=.+$/, 'write MOUNT=FAULT')).default([]),
    'caster-fault': z.string().optional(),
  }),
);
const { port, host, seed, key, cert } = options;
if ((key === undefined) !== (cert === undefined)) stopWith('--key and --cert go together', usage);

try {
  const words = options['caster-fault'];
  const caster = await startCaster({
    mountPoints: demoMountPoints(),
    port,
    host,
    seed,
    ...(key && cert ? { tls: { key: readFileSync(key, 'utf8'), cert: readFileSync(cert, 'utf8') } } : {}),
    ...(words ? { faults: casterFaults(words) } : {}),
  });
  for (const line of options.fault) {
    const at = line.indexOf('=');
    caster.setFaults(line.slice(0, at), streamFaults(line.slice(at + 1)));
  }
  console.log(`The caster listens at ${host}:${caster.port}${key ? ' and speaks TLS' : ''}`);
  for (const signal of ['SIGINT', 'SIGTERM'] as const) process.once(signal, () => void caster.close());
} catch (error) {
  const { code, message } = error as NodeJS.ErrnoException;
  stopWith(code === 'EADDRINUSE' ? `${message}: say another --port` : message, usage);
}
