import type { Environment } from '../config/environment.js';

const WILDCARDS = new Set(['0.0.0.0', '::']);

/** Where browsers reach the server: what is set, else the address that it listens on. */
export function publicUrlOf({
  PUBLIC_URL,
  HOST,
  PORT,
}: Pick<Environment, 'PUBLIC_URL' | 'HOST' | 'PORT'>): string {
  if (PUBLIC_URL) return PUBLIC_URL;
  // "Every address of this machine" is none that a browser can open; an IPv6 address stands in brackets in a URL.
  const host = WILDCARDS.has(HOST) ? 'localhost' : HOST.includes(':') ? `[${HOST}]` : HOST;
  return `http://${host}:${PORT}`;
}
