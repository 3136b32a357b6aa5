import { spawn, type ChildProcess } from 'node:child_process';
import { mkdtempSync, openSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { freePorts } from '../bench/free-ports.js';
import { fromRoot } from './root.js';
import { until } from './until.js';

const program = fromRoot('backend/dist/main.js');

/** The built server in a process of its own, that can be killed and started again on the same files and port. */
export class ServerProcess {
  private child: ChildProcess | null = null;
  /** Where its log goes, for a test that reads it. */
  logFile: string | null = null;

  private constructor(
    readonly folder: string,
    readonly port: number,
    readonly tcpPort: number,
    private readonly environment: Record<string, string>,
  ) {}

  static async make(environment: Record<string, string> = {}): Promise<ServerProcess> {
    const [port, tcpPort] = await freePorts(2);
    return new ServerProcess(mkdtempSync(join(tmpdir(), 'hubtack-server-')), port!, tcpPort!, environment);
  }

  get url(): string {
    return `http://127.0.0.1:${this.port}`;
  }

  get databaseFile(): string {
    return this.environment.DATABASE_FILE ?? join(this.folder, 'hubtack.sqlite');
  }

  async start(): Promise<void> {
    this.child = spawn(process.execPath, ['--enable-source-maps', program], {
      stdio: ['ignore', this.logFile === null ? 'ignore' : openSync(this.logFile, 'a'), 'inherit'],
      env: {
        ...process.env,
        NODE_ENV: 'production',
        LOG_LEVEL: 'fatal',
        DEMO: 'on',
        PORT: String(this.port),
        NMEA_TCP_PORT: String(this.tcpPort),
        DATABASE_FILE: this.databaseFile,
        UPLOADS_DIR: join(this.folder, 'uploads'),
        ...this.environment,
      },
    });
    await until(async () => {
      const answer = await fetch(`${this.url}/health/ready`);
      if (!answer.ok) throw new Error('not ready');
    }, 30_000);
  }

  /** As a power cut does: nothing is said, nothing is finished. */
  kill(): Promise<void> {
    return this.end('SIGKILL');
  }

  /** As an operator does. */
  stop(): Promise<void> {
    return this.end('SIGTERM');
  }

  async remove(): Promise<void> {
    await this.kill();
    rmSync(this.folder, { recursive: true, force: true });
  }

  private async end(signal: NodeJS.Signals): Promise<void> {
    const { child } = this;
    this.child = null;
    if (!child || child.exitCode !== null) return;
    const ended = new Promise((resolve) => {
      child.once('exit', resolve);
    });
    child.kill(signal);
    await ended;
  }
}
