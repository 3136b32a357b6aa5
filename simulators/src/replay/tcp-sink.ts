import { once } from 'node:events';
import { connect } from 'node:net';
import type { Post } from './post-builder.js';

/** Hands posts to the server's plain TCP listener. It answers nothing, so nothing is kept for later. */
export async function openTcpSink(host: string, port: number, key: string) {
  const socket = connect(port, host);
  await once(socket, 'connect');
  let refusal = '';
  socket.on('data', (chunk) => {
    refusal += chunk.toString('latin1');
  });
  socket.write(`KEY ${key}\r\n`);
  return {
    async keep(post: Post): Promise<void> {
      if (!socket.write(post.body)) await once(socket, 'drain');
    },
    /** Answers what the server said, if it said anything: it speaks only to refuse. */
    async close(): Promise<string> {
      socket.end();
      if (!socket.closed) await once(socket, 'close');
      return refusal.trim();
    },
  };
}
