import { z } from 'zod';
import { readOptions, stopWith } from '../cli/options.js';
import { startCaster } from './caster.js';
import { demoMountPoints } from './demo-mount-points.js';
import { streamFaults } from './fault-words.js';

const usage = `A local NTRIP caster, versions 1 and 2, with the demo firm's mount points and faults on demand.

  npm run caster -- [--port 2101] [--seed N] [--fault MOUNT=FAULT[,FAULT...]]...

Faults of a mount point: silent, mute, withdrawn, noStation, onlyGarbage, garbage, badCrc, stall, cut, moved, otherStation.
The login is pennywort, the password field-book-2026; RECORD plays a recorded base and needs none.`;

const options = readOptions(
  usage,
  { port: { type: 'string' }, seed: { type: 'string' }, fault: { type: 'string', multiple: true } },
  z.object({
    port: z.coerce.number().int().min(0).max(65_535).default(2101),
    seed: z.coerce.number().int().min(0).default(1),
    fault: z.array(z.string().regex(/^[^=]+=.+$/, 'write MOUNT=FAULT')).default([]),
  }),
);
try {
  const caster = await startCaster({
    mountPoints: demoMountPoints(),
    port: options.port,
    seed: options.seed,
  });
  for (const line of options.fault) {
    const [name, words] = line.split('=') as [string, string];
    caster.setFaults(name, streamFaults(words));
  }
  console.log(`The caster listens at 127.0.0.1:${caster.port}`);
  for (const signal of ['SIGINT', 'SIGTERM'] as const) process.once(signal, () => void caster.close());
} catch (error) {
  const { code, message } = error as NodeJS.ErrnoException;
  stopWith(code === 'EADDRINUSE' ? `${message}: say another --port` : message, usage);
}
