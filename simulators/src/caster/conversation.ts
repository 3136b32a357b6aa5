import type { Socket } from 'node:net';
import { GGA_LINE, readRequest, type CasterRequest } from './request.js';

interface ConversationHandlers {
  /** The head of the request has come whole; null: it was none. */
  request: (request: CasterRequest | null) => void;
  /** A GGA sentence, from the request or after it. */
  position: (gga: string) => void;
}

/** No head of a real client is longer. */
const MOST_HEAD_BYTES = 8192;
/** A GGA sentence has at most 82 characters by the standard; receivers with more decimals write some more. */
const MOST_LINE_BYTES = 512;
const REQUEST_WITHIN_MS = 30_000;

/** What a client says over one connection: a request, then perhaps positions. What nobody would say is not kept. */
export function listenTo(socket: Socket, handlers: ConversationHandlers): void {
  let held = '';
  let hasAsked = false;
  const refuse = () => {
    hasAsked = true;
    held = '';
    handlers.request(null);
  };
  socket.setTimeout(REQUEST_WITHIN_MS, () => {
    if (!hasAsked) socket.destroy();
  });
  socket.on('data', (chunk: Buffer) => {
    held += chunk.toString('latin1');
    if (!hasAsked) {
      const end = held.indexOf('\r\n\r\n');
      if (end < 0) return held.length > MOST_HEAD_BYTES ? refuse() : undefined;
      const request = readRequest(held.slice(0, end));
      if (!request) return refuse();
      hasAsked = true;
      held = held.slice(end + 4);
      handlers.request(request);
      if (request.gga !== null) handlers.position(request.gga);
    }
    for (const [line] of held.matchAll(GGA_LINE)) handlers.position(line);
    held = held.slice(held.lastIndexOf('\n') + 1).slice(-MOST_LINE_BYTES);
  });
}
