/** Typing faults in a correction login that can be seen as they happen. Common practice, no source. */
export interface TypingFault {
  field: 'address' | 'port' | 'mountPoint';
  words: string;
}

// Zero-width and no-break spaces come along when a login is copied from a mail or a PDF.
const INVISIBLE = /[\u00a0\u200b-\u200f\u2060\ufeff]/;
const USUAL_PORT = 2101;

/** Characters that are taken for one another. */
const LOOK_ALIKES: readonly [RegExp, string][] = [
  [/(?=.*O)(?=.*0)/, 'holds both the letter O and the figure 0'],
  [/(?=.*[lI])(?=.*1)/, 'holds both the letter l or I and the figure 1'],
];

export function typingFaults(given: { address: string; port: unknown; mountPoint: string }): TypingFault[] {
  const faults: TypingFault[] = [];
  const say = (field: TypingFault['field'], words: string) => faults.push({ field, words });
  for (const field of ['address', 'mountPoint'] as const) {
    const text = given[field];
    if (INVISIBLE.test(text)) say(field, 'holds an invisible character; type it anew instead of pasting');
    else if (/\s/.test(text)) say(field, 'holds a space');
  }
  if (/^[a-z]+:\/\//i.test(given.address)) say('address', 'begins with a protocol; write the name only');
  else if (/:\d+$/.test(given.address)) say('address', 'ends with a port; that has a field of its own');
  else if (given.address.includes('/'))
    say('address', 'holds a slash; the mount point has a field of its own');
  if (given.mountPoint.startsWith('/')) say('mountPoint', 'begins with a slash; write the name only');
  for (const [pattern, words] of LOOK_ALIKES) {
    if (pattern.test(given.mountPoint)) say('mountPoint', `${words}: compare it letter by letter`);
  }
  if (/[O]$|[A-Z]{2,}O\d|\dO/.test(given.mountPoint) && !given.mountPoint.includes('0'))
    say('mountPoint', 'holds the letter O where figures usually stand: is it a nought?');
  const port = Number(given.port);
  if (given.port !== '' && Number.isInteger(port) && port >= 1 && port <= 65_535 && port !== USUAL_PORT)
    say('port', `${USUAL_PORT} is usual (IANA: rtcm-sc104)`);
  return faults;
}
