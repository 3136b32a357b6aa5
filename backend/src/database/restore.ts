import { parseEnvironment } from '../config/environment.js';
import { CopyRefused, restore } from './copies.js';

const { DATABASE_FILE } = parseEnvironment(process.env);
const from = process.argv[2];
if (!from) {
  console.error('Usage: npm run db:restore -- BACKUP_FILE   (with the server stopped)');
  process.exit(2);
}
try {
  const aside = await restore(from, DATABASE_FILE, new Date());
  console.log(`Restored ${DATABASE_FILE} from ${from}.`);
  if (aside) console.log(`The database of before is kept as ${aside}.`);
} catch (error) {
  if (!(error instanceof CopyRefused)) throw error;
  console.error(error.message);
  process.exitCode = 1;
}
