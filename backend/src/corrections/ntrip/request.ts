/** One request to a caster. */
export interface NtripRequest {
  version: 1 | 2;
  /** Null asks for the source table. */
  mountPoint: string | null;
  address: string;
  port: number;
  login: { user: string; password: string } | null;
  /** A GGA sentence with its line end, for networks that compute a virtual base; null sends none. */
  gga: string | null;
}

/** Casters look at the first word (RTCM 10410.0, 5.1). */
const AGENT = 'NTRIP Hubtack/0.1';

/**
 * The bytes of a request, after RTCM 10410.0 (version 1) and the sample client of its authors (version 2). In version 1 the
 * position follows the request as a line; in version 2 it is a header.
 */
export function requestBytes(request: NtripRequest): Buffer {
  const { version, mountPoint, address, port, login, gga } = request;
  const host = address.includes(':') ? `[${address}]` : address;
  const lines = [`GET /${encodeURI(mountPoint ?? '')} HTTP/1.${version - 1}`];
  if (version === 2) lines.push(`Host: ${host}:${port}`, 'Ntrip-Version: Ntrip/2.0');
  lines.push(`User-Agent: ${AGENT}`);
  if (version === 2 && gga !== null) lines.push(`Ntrip-GGA: ${gga.trim()}`);
  if (version === 2) lines.push('Connection: close');
  if (login) lines.push(`Authorization: Basic ${basic(login)}`);
  return Buffer.from(`${lines.join('\r\n')}\r\n\r\n${version === 1 && gga !== null ? gga : ''}`);
}

/** RFC 7617, in UTF-8. */
const basic = ({ user, password }: { user: string; password: string }): string =>
  Buffer.from(`${user}:${password}`, 'utf8').toString('base64');
