import { closeSync, createReadStream, openSync, readSync } from 'node:fs';
import { connect } from 'node:net';
import type { Readable } from 'node:stream';
import { setTimeout as delay } from 'node:timers/promises';

/** Where sentences come from: a stored log, or a live receiver. */
export interface Source {
  /** Whether bytes are read as the receiver writes them, so that the clock dates them. */
  live: boolean;
  bytes: AsyncIterable<Uint8Array>;
}

/** A receiver that went away is looked for again after this time. */
const AGAIN_MS = 2000;

/** The bytes of a stream until it ends, or somebody says stop, which is no error. Opened when first read. */
async function* untilStopped(open: () => Readable, stop?: AbortSignal): AsyncGenerator<Uint8Array> {
  const stream = open();
  const destroy = () => stream.destroy();
  stop?.addEventListener('abort', destroy);
  if (stop?.aborted) destroy();
  try {
    for await (const chunk of stream) yield chunk as Uint8Array;
  } catch (error) {
    if (!stop?.aborted) throw error;
  } finally {
    stop?.removeEventListener('abort', destroy);
  }
}

export const fileSource = (file: string, stop?: AbortSignal): Source => ({
  live: false,
  bytes: untilStopped(() => createReadStream(file), stop),
});
export const stdinSource = (stop?: AbortSignal): Source => ({
  live: true,
  bytes: untilStopped(() => process.stdin, stop),
});

export interface ReceiverOptions {
  stop: AbortSignal;
  /** Told once when the receiver goes away, until it is back. */
  onLost: (why: string) => void;
  againMs?: number;
}

/** A live receiver goes away and comes back (battery, cable, range): it is opened again until somebody says stop. */
async function* everAgain(open: () => Readable, options: ReceiverOptions): AsyncGenerator<Uint8Array> {
  const { stop, onLost, againMs = AGAIN_MS } = options;
  let isLost = false;
  while (!stop.aborted) {
    let why = 'it has closed the connection';
    try {
      for await (const chunk of untilStopped(open, stop)) {
        isLost = false;
        yield chunk;
      }
    } catch (error) {
      why = (error as Error).message;
    }
    if (stop.aborted) return;
    if (!isLost) onLost(why);
    isLost = true;
    await delay(againMs, undefined, { signal: stop }).catch(() => undefined);
  }
}

/** Reads a receiver that serves its output over TCP. */
export function tcpSource(host: string, port: number, options: ReceiverOptions): Source {
  return { live: true, bytes: everAgain(() => connect(port, host), options) };
}

/** Reads a receiver on a serial line. */
export async function serialSource(
  device: string,
  baudRate: number,
  options: ReceiverOptions,
): Promise<Source> {
  const { SerialPort } = await import('serialport');
  return { live: true, bytes: everAgain(() => new SerialPort({ path: device, baudRate }), options) };
}

/** Enough of a log to find its first date in. */
const HEAD_BYTES = 1_000_000;

export function headOf(file: string): Uint8Array {
  const head = new Uint8Array(HEAD_BYTES);
  const handle = openSync(file, 'r');
  try {
    return head.subarray(0, readSync(handle, head, 0, HEAD_BYTES, 0));
  } finally {
    closeSync(handle);
  }
}
