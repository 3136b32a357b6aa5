import { mkdirSync } from 'node:fs';
import { dirname } from 'node:path';
import { migrateDatabase, openDatabase } from '@hubtack/drizzle/database.js';
import { parseEnvironment } from '../config/environment.js';

const { DATABASE_FILE } = parseEnvironment(process.env);
mkdirSync(dirname(DATABASE_FILE), { recursive: true });
const database = openDatabase(DATABASE_FILE);
migrateDatabase(database);
database.$client.close();
console.log(`${DATABASE_FILE} is up to date`);
