/** A request as a caster reads it (RTCM 10410.0 and 10410.1). */
export interface CasterRequest {
  version: 1 | 2;
  /** Null asks for the source table. */
  mountPoint: string | null;
  userAgent: string;
  authorization: string | null;
  /** Of the Ntrip-GGA header. */
  gga: string | null;
}

export const GGA_LINE = /\$..GGA,[^\r\n]*(?=\r?\n)/g;

/** Reads the head of a request, without its blank line. */
export function readRequest(head: string): CasterRequest {
  const [first = '', ...lines] = head.split('\r\n');
  const headers = new Map(
    lines.map((line) => {
      const colon = line.indexOf(':');
      return [line.slice(0, colon).toLowerCase(), line.slice(colon + 1).trim()] as const;
    }),
  );
  const path = decodeURI(first.split(' ')[1] ?? '/').replace(/^\//, '');
  return {
    version: headers.get('ntrip-version') === 'Ntrip/2.0' ? 2 : 1,
    mountPoint: path === '' ? null : path,
    userAgent: headers.get('user-agent') ?? '',
    authorization: headers.get('authorization') ?? null,
    gga: headers.get('ntrip-gga') ?? null,
  };
}
