import { connect as connectPlain, isIP, type Socket } from 'node:net';
import { connect as connectTls } from 'node:tls';
import type { Resolved } from './addresses.js';
import { NtripProblem } from './problem.js';

interface Target {
  /** As it was typed: what a certificate must be for. */
  address: string;
  port: number;
  tls: boolean;
}

const CERTIFICATE = /CERT|SELF_SIGNED|UNABLE_TO_|ALTNAME|HOSTNAME/;

function problemOf(error: NodeJS.ErrnoException, { address, port, tls }: Target): NtripProblem {
  const code = error.code ?? '';
  const cause = { cause: error };
  if (code === 'ECONNREFUSED')
    return new NtripProblem(
      `Nothing answers at port ${port} of ${address}: the connection was refused.`,
      'Check the port: 2101 is usual. The caster may also be down.',
      cause,
    );
  if (code === 'EHOSTUNREACH' || code === 'ENETUNREACH')
    return new NtripProblem(`There is no way to ${address} from this server.`, 'Check the address.', cause);
  if (tls && CERTIFICATE.test(code))
    return new NtripProblem(
      `The certificate of ${address} is not in order (${code}).`,
      'Write the name that the certificate is for, or ask the operator. Do not switch TLS off to get round it.',
      cause,
    );
  if (tls && (/SSL|EPROTO/.test(code) || code === 'ECONNRESET'))
    return new NtripProblem(
      `${address} does not speak TLS at port ${port}.`,
      'Many casters speak TLS at a port of its own, others not at all: ask the operator which it is.',
      cause,
    );
  return new NtripProblem(
    `The connection to ${address}, port ${port}, failed (${code || error.message}).`,
    'Check address and port, and try again.',
    cause,
  );
}

/** Connects to what the name was resolved to. @throws NtripProblem; the signal's reason when it is aborted */
export function openConnection(target: Target, to: Resolved, signal: AbortSignal): Promise<Socket> {
  const { address, port, tls } = target;
  return new Promise((resolve, reject) => {
    const where = { host: to.address, port, family: to.family };
    const socket = tls
      ? connectTls({ ...where, ...(isIP(address) === 0 ? { servername: address } : {}) })
      : connectPlain(where);
    const stop = (error: Error) => {
      signal.removeEventListener('abort', onAbort);
      socket.destroy();
      reject(error);
    };
    const onAbort = () => stop(signal.reason as Error);
    const onError = (error: Error) => stop(problemOf(error, target));
    if (signal.aborted) return onAbort();
    signal.addEventListener('abort', onAbort, { once: true });
    socket.once('error', onError);
    socket.once(tls ? 'secureConnect' : 'connect', () => {
      signal.removeEventListener('abort', onAbort);
      socket.removeListener('error', onError);
      resolve(socket);
    });
  });
}
