import { spawn, type ChildProcess } from 'node:child_process';
import { createServer } from 'node:net';
import { setTimeout as delay } from 'node:timers/promises';

/** Child processes of the demo: started together, stopped together. */
export class Processes {
  private readonly children: ChildProcess[] = [];
  private stopping = false;

  start(
    name: string,
    command: string,
    args: string[],
    env: Record<string, string> = {},
    output: 'shown' | 'errors' = 'errors',
  ): ChildProcess {
    const stdout = output === 'shown' ? 'inherit' : 'ignore';
    const child = spawn(command, args, {
      env: { ...process.env, ...env },
      stdio: ['ignore', stdout, 'inherit'],
    });
    child.on('exit', (code) => {
      if (this.stopping) return;
      console.error(`${name} has ended${code === null ? '' : ` with status ${code}`}`);
      void this.stop().then(() => process.exit(code ?? 1));
    });
    this.children.push(child);
    return child;
  }

  async stop(): Promise<void> {
    this.stopping = true;
    for (const child of this.children.toReversed()) {
      if (child.exitCode !== null || child.signalCode !== null) continue;
      const ended = new Promise((resolve) => {
        child.once('exit', resolve);
      });
      child.kill('SIGTERM');
      await Promise.race([ended, delay(8000, undefined, { ref: false })]);
      child.kill('SIGKILL');
    }
  }
}

/** The wanted port if nobody has it, else one that the system gives. */
export function freePort(wanted: number): Promise<number> {
  const tryPort = (port: number) =>
    new Promise<number | null>((resolve) => {
      const probe = createServer();
      probe.once('error', () => resolve(null));
      probe.listen(port, '127.0.0.1', () => {
        const address = probe.address();
        probe.close(() => resolve(typeof address === 'object' && address ? address.port : null));
      });
    });
  return tryPort(wanted).then(async (port) => port ?? (await tryPort(0))!);
}

/** Waits until a server says that it is ready; throws when it has not after `seconds`. */
export async function waitUntilReady(url: string, seconds: number): Promise<void> {
  for (let tries = 0; tries < seconds * 10; tries++) {
    const answer = await fetch(new URL('/health/ready', url)).catch(() => null);
    if (answer?.ok) return;
    await delay(100);
  }
  throw new Error(`The server at ${url} is not ready after ${seconds} s`);
}
