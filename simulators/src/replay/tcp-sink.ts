import { once } from 'node:events';
import { connect } from 'node:net';
import type { Post } from './post-builder.js';

/** Hands posts to the server's plain TCP listener. It answers nothing, so nothing is kept for later. */
export async function openTcpSink(host: string, port: number, key: string) {
  const socket = connect(port, host);
  await once(socket, 'connect');
  const closed = new Promise<void>((resolve) => {
    socket.once('close', () => resolve());
  });
  let said = '';
  let problem = '';
  socket.on('data', (chunk) => {
    said += chunk.toString('latin1');
  });
  socket.on('error', (error) => {
    problem = error.message;
  });
  // The server speaks only to refuse.
  const refusal = () =>
    said.trim() ? `The server said: ${said.trim()}` : problem && `The connection broke: ${problem}`;
  socket.write(`KEY ${key}\r\n`);
  return {
    async keep(post: Post): Promise<void> {
      if (!socket.writable) throw new Error(refusal() || 'The server has closed the connection');
      if (!socket.write(post.body)) {
        const drained = new Promise<void>((resolve) => {
          socket.once('drain', resolve);
        });
        await Promise.race([drained, closed]);
      }
    },
    /** Answers why not all of it was taken; empty when nothing was said against it. */
    async close(): Promise<string> {
      socket.end();
      await closed;
      return refusal();
    },
  };
}
