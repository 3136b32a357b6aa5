import { parseEnvironment } from '../config/environment.js';
import { CopyRefused, backUp } from './copies.js';

const { DATABASE_FILE } = parseEnvironment(process.env);
const stamp = new Date().toISOString().slice(0, 19).replaceAll(':', '-');
const to = process.argv[2] ?? `var/backups/hubtack-${stamp}.sqlite`;
try {
  await backUp(DATABASE_FILE, to);
  console.log(`Backed up to ${to}; its integrity was checked.`);
} catch (error) {
  if (!(error instanceof CopyRefused)) throw error;
  console.error(error.message);
  process.exitCode = 1;
}
