// Fails when generating migrations from the schema would change the tree.
import { execFileSync } from 'node:child_process';
import { cpSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';

const folder = mkdtempSync('node_modules/.migrations-check-');
const kit = (...args) => execFileSync('npx', ['drizzle-kit', ...args], { encoding: 'utf8' });
try {
  cpSync('drizzle/migrations', folder, { recursive: true });
  const before = readdirSync(folder).length;
  kit('check', '--dialect', 'sqlite', '--out', folder);
  const said = kit(
    'generate',
    '--dialect',
    'sqlite',
    '--schema',
    'drizzle/dist/schema/index.js',
    '--out',
    folder,
  );
  if (readdirSync(folder).length !== before || !said.includes('No schema changes')) {
    console.error('The schema has changes without a migration: run `npm run db:generate` and read the SQL.');
    process.exitCode = 1;
  } else console.log('migrations are up to date');
} finally {
  rmSync(join(folder), { recursive: true, force: true });
}
