/**
 * Typing faults in a correction login that can be seen as they happen, because one mistyped character is the usual
 * reason for "no fix" (common practice, no source).
 */
export type LoginField = 'address' | 'port' | 'mountPoint' | 'user' | 'password';

export interface TypingFault {
  field: LoginField;
  words: string;
}

// Zero-width and no-break spaces, soft hyphens and control characters come along when a login is copied from a mail.
const INVISIBLE = /(?![\t\n\r])[\p{Cc}\p{Cf}\p{Zl}\p{Zp}\u00a0]/u;
const USUAL_PORT = 2101;

/** What can never be right in a field, in words that follow "it". Empty when nothing is. */
export function impossible(field: 'address' | 'mountPoint' | 'user' | 'password', text: string): string[] {
  const words: string[] = [];
  if (INVISIBLE.test(text)) words.push('holds an invisible character; type it anew instead of pasting');
  else if (field === 'password' || field === 'user') {
    if (text !== text.trim()) words.push('begins or ends with a space');
  } else if (/\s/.test(text)) words.push('holds a space');
  if (field === 'user' && text.includes(':')) words.push('holds a colon, which a login cannot (RFC 7617)');
  if (field === 'address') {
    if (/^[a-z][a-z0-9+.-]*:\/\//i.test(text)) words.push('begins with a protocol; write the name only');
    else if (/^[^:]*:\d+$|^\[.*\]:\d+$/.test(text))
      words.push('ends with a port; that has a field of its own');
    else if (text.includes('/')) words.push('holds a slash; the mount point has a field of its own');
    else if (text.includes('@')) words.push('holds a login; user and password have fields of their own');
  }
  if (field === 'mountPoint') {
    if (text.startsWith('/')) words.push('begins with a slash; write the name only');
    else if (/[/?#;]/.test(text)) words.push('holds a character that no mount point has');
  }
  return words;
}

/** Characters that are taken for one another. */
const LOOK_ALIKES: readonly [RegExp, string][] = [
  [/(?=.*O)(?=.*0)/, 'holds both the letter O and the figure 0'],
  [/(?=.*[lI])(?=.*1)/, 'holds both the letter l or I and the figure 1'],
];

interface TypedLogin {
  address: string;
  port: unknown;
  mountPoint: string;
  user?: string;
  password?: string;
}

/** What looks mistyped, the impossible and the merely unusual. */
export function typingFaults(given: TypedLogin): TypingFault[] {
  const faults: TypingFault[] = [];
  const say = (field: LoginField, words: string) => faults.push({ field, words });
  for (const field of ['address', 'mountPoint', 'user', 'password'] as const)
    for (const words of impossible(field, given[field] ?? '')) say(field, words);
  for (const field of ['mountPoint', 'user'] as const)
    for (const [pattern, words] of LOOK_ALIKES)
      if (pattern.test(given[field] ?? '')) say(field, `${words}: compare it letter by letter`);
  if (/[O]$|[A-Z]{2,}O\d|\dO/.test(given.mountPoint) && !given.mountPoint.includes('0'))
    say('mountPoint', 'holds the letter O where figures usually stand: is it a nought?');
  const port = Number(given.port);
  if (given.port !== '' && Number.isInteger(port) && port >= 1 && port <= 65_535 && port !== USUAL_PORT)
    say('port', `${USUAL_PORT} is usual (IANA: rtcm-sc104)`);
  return faults;
}
