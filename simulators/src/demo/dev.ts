import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { Processes } from './processes.js';

/** `npm run dev`: types and builds as you write, the server restarts, the dashboard reloads. */
const root = fileURLToPath(new URL('../../../', import.meta.url));
const processes = new Processes();
for (const signal of ['SIGINT', 'SIGTERM'] as const)
  process.once(signal, () => void processes.stop().then(() => process.exit(0)));

const tsc = [
  'tsc',
  '-b',
  '--watch',
  '--preserveWatchOutput',
  'contracts',
  'drizzle',
  'backend',
  'simulators',
];
processes.start('The compiler', 'npx', tsc, {}, 'shown');
const server = ['--watch', '--enable-source-maps', join(root, 'backend/dist/main.js')];
processes.start(
  'The server',
  process.execPath,
  server,
  { DATABASE_FILE: join(root, 'var/dev/hubtack.sqlite') },
  'shown',
);
processes.start('The dashboard', 'npm', ['run', 'dev', '-w', 'dashboard'], {}, 'shown');
