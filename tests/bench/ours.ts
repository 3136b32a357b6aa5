import { spawn, type ChildProcess } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { PasswordService } from '@hubtack/backend/auth/password.service.js';
import { migrateDatabase, openDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { roverAssignments, roverKeys, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { spans } from '@hubtack/drizzle/schema/spans.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { Client } from '../harness/client.js';
import { fromRoot } from '../harness/root.js';
import { NODE_FLAGS, bytesWrittenBy, makeFolder, removeFolder } from './child.js';
import { freePorts } from './free-ports.js';

const PASSWORD = 'words for the bench';
const EMAIL = 'bench@pennywort.example';

export interface OursOptions {
  rovers: number;
  environment?: Record<string, string>;
  /** Spans of the first rover, put there before the start. */
  spansOfFirst?: { start: number; end: number; state: 'fixed' | 'float' | 'code' | 'none' }[];
}

/** The built server as it is run for real, with rovers and a dispatcher. */
export class Ours {
  private constructor(
    readonly url: string,
    readonly port: number,
    readonly tcpPort: number,
    readonly keys: string[],
    readonly databaseFile: string,
    readonly client: Client,
    private readonly process: ChildProcess,
    private readonly folder: string,
  ) {}

  static async start(options: OursOptions): Promise<Ours> {
    const folder = makeFolder();
    const databaseFile = join(folder, 'hubtack.sqlite');
    const keys = await fill(databaseFile, options);
    const [port, tcpPort] = await freePorts(2);
    const program = fromRoot('backend/dist/main.js');
    const child = spawn(process.execPath, [...NODE_FLAGS, program], {
      stdio: ['ignore', 'ignore', 'inherit'],
      env: {
        ...process.env,
        NODE_ENV: 'production',
        LOG_LEVEL: 'error',
        PORT: String(port),
        NMEA_TCP_PORT: String(tcpPort),
        DATABASE_FILE: databaseFile,
        UPLOADS_DIR: join(folder, 'uploads'),
        ...options.environment,
      },
    });
    const url = `http://127.0.0.1:${port}`;
    for (let tries = 0; tries < 200; tries++) {
      const answer = await fetch(`${url}/health/ready`).catch(() => null);
      if (answer?.ok) break;
      await new Promise((resolve) => {
        setTimeout(resolve, 50);
      });
    }
    const client = new Client(url);
    const answer = await client.signIn(EMAIL, PASSWORD);
    if (!answer.ok) throw new Error(`the server under measurement does not start: ${await answer.text()}`);
    return new Ours(url, port!, tcpPort!, keys, databaseFile, client, child, folder);
  }

  async accepted(): Promise<number> {
    const text = await (await fetch(`${this.url}/metrics`)).text();
    return Number(/^hubtack_epochs_accepted_total (\d+)/m.exec(text)?.[1] ?? 0);
  }

  bytesWritten(): number {
    return bytesWrittenBy(this.process.pid!);
  }

  /** Resident memory, MB. */
  memoryMb(): number {
    return (
      Number(/^VmRSS:\s+(\d+)/m.exec(readFileSync(`/proc/${this.process.pid}/status`, 'utf8'))![1]) / 1024
    );
  }

  async stop(): Promise<void> {
    const ended = new Promise((resolve) => {
      this.process.once('exit', resolve);
    });
    this.process.kill('SIGKILL');
    await ended;
    removeFolder(this.folder);
  }
}

async function fill(file: string, options: OursOptions): Promise<string[]> {
  const passwordHash = await new PasswordService().hash(PASSWORD);
  const database = openDatabase(file);
  migrateDatabase(database);
  const createdAt = Date.now() - 14 * 86_400_000;
  const keys = database.transaction((tx) => {
    tx.insert(users).values({ name: 'Bench', email: EMAIL, role: 'manager', passwordHash, createdAt }).run();
    return Array.from({ length: options.rovers }, (_, index) => {
      const key = `hub_${randomBytes(32).toString('base64url')}`;
      const keyHash = createHash('sha256').update(key).digest('hex');
      const crewId = tx
        .insert(crews)
        .values({ name: `Crew ${index + 1}`, pattern: [] })
        .returning()
        .get().id;
      const roverId = tx
        .insert(rovers)
        .values({ label: `R-${index + 1}` })
        .returning()
        .get().id;
      tx.insert(roverAssignments).values({ roverId, crewId, startAt: createdAt }).run();
      tx.insert(roverKeys)
        .values({ roverId, keyHash, hint: key.slice(0, 9), createdAt })
        .run();
      return key;
    });
  });
  for (const span of options.spansOfFirst ?? [])
    database
      .insert(spans)
      .values({ roverId: 1, ...span })
      .run();
  database.$client.close();
  return keys;
}
