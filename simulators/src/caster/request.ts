/** A request as a caster reads it (RTCM 10410.0 and 10410.1). */
export interface CasterRequest {
  method: string;
  version: 1 | 2;
  /** Null asks for the source table. */
  mountPoint: string | null;
  userAgent: string;
  login: { user: string; password: string } | null;
  /** Of the Ntrip-GGA header. */
  gga: string | null;
}

/** A whole GGA line; one that is still being sent waits. */
export const GGA_LINE = /\$..GGA,[^\r\n]*(?=\r?\n)/g;

/** Reads the head of a request, without its blank line; null when it is none. */
export function readRequest(head: string): CasterRequest | null {
  const [first = '', ...lines] = head.split('\r\n');
  const [method, target] = first.split(' ');
  if (!method || target === undefined) return null;
  const headers = new Map(
    lines.map((line) => {
      const colon = line.indexOf(':');
      return [line.slice(0, colon).toLowerCase(), line.slice(colon + 1).trim()] as const;
    }),
  );
  const path = pathOf(target);
  if (path === null) return null;
  return {
    method,
    version: headers.get('ntrip-version')?.toLowerCase() === 'ntrip/2.0' ? 2 : 1,
    mountPoint: path === '' ? null : path,
    userAgent: headers.get('user-agent') ?? '',
    login: readBasic(headers.get('authorization') ?? ''),
    gga: headers.get('ntrip-gga') ?? null,
  };
}

function pathOf(target: string): string | null {
  try {
    return decodeURI(target).replace(/^\//, '');
  } catch {
    // A per cent sign that begins no character.
    return null;
  }
}

/** RFC 7617; the password may hold colons. */
function readBasic(header: string): CasterRequest['login'] {
  const [, encoded] = /^Basic +(\S+)$/i.exec(header) ?? [];
  if (encoded === undefined) return null;
  const text = Buffer.from(encoded, 'base64').toString('utf8');
  const colon = text.indexOf(':');
  return colon < 0
    ? { user: text, password: '' }
    : { user: text.slice(0, colon), password: text.slice(colon + 1) };
}
