import type { Socket } from 'node:net';
import { ReplyReader, type ReplyHead } from './reply-reader.js';
import { requestBytes, type NtripRequest } from './request.js';

export interface ExchangeHandlers {
  head: (head: ReplyHead) => void;
  body: (bytes: Uint8Array) => void;
  /** The answer is complete, or the other side has closed. Called once. */
  end: () => void;
}

/** Sends one request over an open connection and hands on what comes. Answers a way to close it; nothing is called after that. */
export function exchange(socket: Socket, request: NtripRequest, handlers: ExchangeHandlers): () => void {
  let isOver = false;
  const close = () => {
    isOver = true;
    socket.destroy();
  };
  const end = () => {
    if (isOver) return;
    close();
    handlers.end();
  };
  const reader = new ReplyReader({
    head: (head) => !isOver && handlers.head(head),
    body: (bytes) => !isOver && handlers.body(bytes),
    done: end,
  });
  socket.on('data', (chunk: Buffer) => !isOver && reader.push(chunk));
  socket.once('end', () => {
    reader.end();
    end();
  });
  // A reset in the middle ends the answer like any other end: what came is judged.
  socket.on('error', end);
  socket.once('close', end);
  socket.write(requestBytes(request));
  return close;
}
