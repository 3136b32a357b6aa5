import { createHash } from 'node:crypto';
import { mkdirSync, realpathSync, rmSync } from 'node:fs';
import { connect, createServer, type Server } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const listen = (server: Server, address: string) =>
  new Promise<NodeJS.ErrnoException | null>((resolve) => {
    server.once('error', resolve);
    server.listen(address, () => resolve(null));
  });

const isAnswered = (address: string) =>
  new Promise<boolean>((resolve) => {
    const probe = connect(address);
    probe.once('error', () => resolve(false));
    probe.once('connect', () => {
      probe.destroy();
      resolve(true);
    });
  });

/** Where the process that holds a folder listens. */
export function addressOf(folder: string): string {
  const name = `hubtack-${createHash('sha256').update(realpathSync(folder)).digest('hex').slice(0, 16)}`;
  return process.platform === 'win32' ? `\\\\.\\pipe\\${name}` : join(tmpdir(), `${name}.sock`);
}

/**
 * Claims a folder for this process until it ends, however it ends; answers how to give it back, or null when another
 * process holds it. A listening local socket rather than a file with a process number: after a power cut such a file
 * stays, and its number may belong to somebody else, who would keep an unattended sender from starting.
 */
export async function claimFolder(folder: string): Promise<(() => void) | null> {
  mkdirSync(folder, { recursive: true });
  const address = addressOf(folder);
  const server = createServer((socket) => socket.destroy());
  let problem = await listen(server, address);
  if (problem?.code === 'EADDRINUSE' && !(await isAnswered(address))) {
    // Left behind by a process that was killed.
    rmSync(address, { force: true });
    problem = await listen(server, address);
  }
  if (problem?.code === 'EADDRINUSE') return null;
  if (problem) throw problem;
  server.unref();
  return () => void server.close();
}
