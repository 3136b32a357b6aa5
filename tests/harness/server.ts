import { mkdtempSync, rmSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { AppModule } from '@hubtack/backend/app.module.js';
import { configureApplication } from '@hubtack/backend/application.js';
import { PasswordService } from '@hubtack/backend/auth/password.service.js';
import { Clock } from '@hubtack/backend/common/clock.js';
import { parseEnvironment } from '@hubtack/backend/config/environment.js';
import { DATABASE } from '@hubtack/backend/database/database.module.js';
import { NmeaTcpListener } from '@hubtack/backend/ingest/nmea-tcp.listener.js';
import type { Role } from '@hubtack/contracts/auth/role.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { Test } from '@nestjs/testing';
import { Client, type TestRover } from './client.js';
import { MovingClock } from './moving-clock.js';

export const PASSWORD = 'a few words for the test';
let passwordHash: Promise<string> | null = null;

export interface TestServer {
  app: NestExpressApplication;
  url: string;
  tcpPort: number;
  database: HubtackDatabase;
  databaseFile: string;
  clock: MovingClock;
  /** Signs somebody in; the account is made at first use. A crew chief needs a crew. */
  as: (role: Role, crewId?: number) => Promise<Client>;
  makeRover: (label?: string, crewId?: number) => Promise<TestRover>;
  makeCrew: (name: string, change?: Record<string, unknown>) => Promise<number>;
  close: () => Promise<void>;
}

/** The whole application in this process, on a port and a database file of its own. */
export async function startServer(environment: Record<string, string> = {}): Promise<TestServer> {
  const folder = mkdtempSync(join(tmpdir(), 'hubtack-test-'));
  const databaseFile = join(folder, 'hubtack.sqlite');
  const parsed = parseEnvironment({
    NODE_ENV: 'test',
    PORT: '0',
    NMEA_TCP_PORT: '0',
    LOG_LEVEL: 'silent',
    DATABASE_FILE: databaseFile,
    UPLOADS_DIR: join(folder, 'uploads'),
    ...environment,
  });
  const clock = new MovingClock();
  const module = await Test.createTestingModule({ imports: [AppModule.of(parsed)] })
    .overrideProvider(Clock)
    .useValue(clock)
    .compile();
  const app = module.createNestApplication<NestExpressApplication>({ bodyParser: false });
  if (parsed.LOG_LEVEL === 'silent') app.useLogger(false);
  configureApplication(app, parsed);
  await app.listen(0, '127.0.0.1');
  const { port } = app.getHttpServer().address() as AddressInfo;
  const url = `http://127.0.0.1:${port}`;
  const database = app.get<HubtackDatabase>(DATABASE);
  passwordHash ??= app.get(PasswordService).hash(PASSWORD);
  const hash = await passwordHash;
  const clients = new Map<string, Client>();

  const as = async (role: Role, crewId?: number): Promise<Client> => {
    const email = `${role}${crewId ?? ''}@pennywort.example`.toLowerCase();
    const known = clients.get(email);
    if (known) return known;
    database
      .insert(users)
      .values({ name: role, email, role, crewId: crewId ?? null, passwordHash: hash, createdAt: clock.now() })
      .run();
    const client = new Client(url);
    const answer = await client.signIn(email, PASSWORD);
    if (!answer.ok) throw new Error(await answer.text());
    clients.set(email, client);
    return client;
  };
  let rovers = 0;
  const makeRover = async (label = `R-${100 + rovers++}`, crewId?: number): Promise<TestRover> => {
    const manager = await as('manager');
    const { id } = await manager.json<{ id: number }>('POST', '/api/rovers', { label });
    const { key } = await manager.json<{ key: string }>('POST', `/api/rovers/${id}/key`);
    if (crewId !== undefined) await manager.json('POST', `/api/rovers/${id}/assignments`, { crewId });
    return { id, key };
  };
  const makeCrew = async (name: string, change: Record<string, unknown> = {}): Promise<number> => {
    const body = { name, phone: null, siteId: null, hourlyRate: null, pattern: [], ...change };
    return (await (await as('manager')).json<{ id: number }>('POST', '/api/crews', body)).id;
  };
  return {
    app,
    url,
    tcpPort: app.get(NmeaTcpListener).port!,
    database,
    databaseFile,
    clock,
    as,
    makeRover,
    makeCrew,
    close: async () => {
      await app.close();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
