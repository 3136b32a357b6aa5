import type { Socket } from 'node:net';
import { exchange } from '../ntrip/exchange.js';
import type { ReplyHead } from '../ntrip/reply-reader.js';
import type { NtripRequest } from '../ntrip/request.js';
import { StreamMeter } from './stream-meter.js';

export interface LookLimits {
  /** Until the head of the answer, ms. */
  firstReplyMs: number;
  /** From the head to the first byte of data, ms. */
  firstByteMs: number;
  /** How long is looked from the first byte on, ms. */
  lookMs: number;
  /** How long when no base position has come by then, ms: some bases send it every half minute only. */
  longLookMs: number;
  /** So long without a byte is a stall, ms. */
  stallMs: number;
}

export interface Look {
  head: ReplyHead | null;
  meter: StreamMeter;
  /** `looked`: long enough; `silent`: no first byte; `stalled`: bytes stopped; `closed`: the other side ended it; `refused`: no stream. */
  end: 'looked' | 'silent' | 'stalled' | 'closed' | 'refused';
  lookedMs: number;
}

export const isStream = ({ kind, status, headers }: ReplyHead): boolean =>
  kind === 'icy' ||
  (kind === 'http' &&
    status === 200 &&
    !/sourcetable|text\/html/i.test(headers.get('content-type') ?? '') &&
    !headers.has('content-encoding'));

/** Rovers say where they are this often. */
const POSITION_EVERY_MS = 10_000;
/** A stream has some kilobytes a second (RTCM 10410.0, 3.4): whoever sends more is not looked at for longer. */
const MOST_BYTES = 1024 * 1024;
/** Looked at this often whether the time is over. */
const TICK_MS = 50;

/**
 * Asks for the stream and looks at it for a while. Rejects with the signal's reason only. `gga`: sent again every ten
 * seconds, as rovers do; null sends none.
 */
export function lookAtStream(
  socket: Socket,
  request: NtripRequest,
  limits: LookLimits,
  parts: {
    signal: AbortSignal;
    now: () => number;
    gga: () => string | null;
    onAccepted: (head: ReplyHead) => void;
    onData: (meter: StreamMeter) => void;
  },
): Promise<Look> {
  const { signal, now } = parts;
  return new Promise((resolve, reject) => {
    const startedAt = now();
    const meter = new StreamMeter(startedAt);
    let head: ReplyHead | null = null;
    let acceptedAt = startedAt;
    let sentAt = startedAt;
    let firstByteAt: number | null = null;
    let seenBytes = 0;
    const settle = (end: Look['end'] | Error) => {
      clearInterval(timer);
      signal.removeEventListener('abort', onAbort);
      close();
      if (end instanceof Error) reject(end);
      else resolve({ head, meter, end, lookedMs: firstByteAt === null ? 0 : now() - firstByteAt });
    };
    const onAbort = () => settle(signal.reason as Error);
    signal.addEventListener('abort', onAbort, { once: true });
    const sendPosition = () => {
      const gga = parts.gga();
      if (gga === null || socket.destroyed) return;
      sentAt = now();
      socket.write(gga);
    };
    const tick = () => {
      const at = now();
      if (head === null) {
        if (at - startedAt >= limits.firstReplyMs) settle('silent');
        return;
      }
      if (at - sentAt >= POSITION_EVERY_MS) sendPosition();
      if (firstByteAt === null) {
        if (at - acceptedAt >= limits.firstByteMs) settle('silent');
        return;
      }
      parts.onData(meter);
      if (at - meter.lastByteAt! >= limits.stallMs) settle('stalled');
      else if (at - firstByteAt >= (meter.stations > 0 ? limits.lookMs : limits.longLookMs)) settle('looked');
    };
    const timer = setInterval(tick, TICK_MS);
    const close = exchange(socket, request, {
      head: (found) => {
        head = found;
        acceptedAt = now();
        if (!isStream(found)) return settle('refused');
        parts.onAccepted(found);
        // A version 1 caster passes over the header that a version 2 request has it in.
        if (request.version === 2 && found.kind === 'icy') sendPosition();
      },
      body: (bytes) => {
        firstByteAt ??= now();
        meter.push(bytes, now());
        seenBytes += bytes.length;
        if (seenBytes > MOST_BYTES) settle('looked');
      },
      end: () => settle('closed'),
    });
  });
}
