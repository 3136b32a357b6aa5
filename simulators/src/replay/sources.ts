import { createReadStream, readFileSync } from 'node:fs';
import { connect } from 'node:net';

/** Where sentences come from: a stored log, or a live receiver. */
export interface Source {
  /** Whether bytes are read as the receiver writes them, so that the clock dates them. */
  live: boolean;
  bytes: AsyncIterable<Uint8Array>;
}

export const fileSource = (file: string): Source => ({ live: false, bytes: createReadStream(file) });
export const stdinSource = (): Source => ({ live: true, bytes: process.stdin });

/** Reads a receiver that serves its output over TCP. */
export function tcpSource(host: string, port: number): Source {
  return { live: true, bytes: connect(port, host) };
}

/** Reads a receiver on a serial line. */
export async function serialSource(device: string, baudRate: number): Promise<Source> {
  const { SerialPort } = await import('serialport');
  return { live: true, bytes: new SerialPort({ path: device, baudRate }) };
}

/** Enough of a log to find its first date in. */
const HEAD_BYTES = 1_000_000;
export const headOf = (file: string): Uint8Array => readFileSync(file).subarray(0, HEAD_BYTES);
