import { fork, type ChildProcess } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/**
 * As `npm start` runs the server, and the floors alike: requests of a synchronised burst are all alive at once, and with
 * the default young generation each of its collections copies them.
 */
export const NODE_FLAGS = ['--max-semi-space-size=32'];

export const makeFolder = (): string => mkdtempSync(join(tmpdir(), 'hubtack-bench-'));
export const removeFolder = (folder: string): void => rmSync(folder, { recursive: true, force: true });

/** A program under measurement, in a process of its own. */
export class Child {
  private constructor(
    private readonly process: ChildProcess,
    readonly port: number,
    /** All that it told at its start. */
    readonly told: object,
  ) {}

  /** Starts a program of this folder, which tells its port. */
  static async start(program: string, args: string[]): Promise<Child> {
    const file = fileURLToPath(new URL(program, import.meta.url));
    const process = fork(file, args, { stdio: ['ignore', 'ignore', 'inherit', 'ipc'], execArgv: NODE_FLAGS });
    const told = await Child.answer<{ port: number }>(process);
    return new Child(process, told.port, told);
  }

  ask<T>(message: object): Promise<T> {
    const answer = Child.answer<T>(this.process);
    this.process.send(message);
    return answer;
  }

  /** Bytes that the process has caused to be written to disk so far. */
  bytesWritten(): number {
    return bytesWrittenBy(this.process.pid!);
  }

  async stop(): Promise<void> {
    const ended = new Promise((resolve) => {
      this.process.once('exit', resolve);
    });
    this.process.kill('SIGKILL');
    await ended;
  }

  private static answer<T>(process: ChildProcess): Promise<T> {
    return new Promise((resolve, reject) => {
      process.once('error', reject);
      process.once('message', (message) => {
        process.off('error', reject);
        resolve(message as T);
      });
    });
  }
}

export function bytesWrittenBy(pid: number): number {
  return Number(/^write_bytes: (\d+)$/m.exec(readFileSync(`/proc/${pid}/io`, 'utf8'))![1]);
}
