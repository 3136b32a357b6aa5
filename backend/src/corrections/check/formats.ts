import type { CheckedStream } from '@hubtack/contracts/corrections/check.js';
import type { CorrectionFormat } from '@hubtack/contracts/corrections/correction-source.js';
import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import { isLegacyObservation, isMsm, isStationMessage } from '@hubtack/contracts/rtcm/messages.js';

export interface FormatVerdict {
  passed: boolean;
  seen: string;
  toTry: string;
  warnings: string[];
}

/** Message numbers in a source table's list, such as `1004(1),1005/1006(10)`; with the period in seconds where it says one. */
export function listedMessages(details: string | null): Map<number, number | null> {
  const listed = new Map<number, number | null>();
  for (const [, numbers, period] of (details ?? '').matchAll(/(\d{4}(?:\/\d{4})*)(?:\((\d+(?:\.\d+)?)\))?/g))
    for (const number of numbers!.split('/'))
      listed.set(Number(number), period === undefined ? null : Number(period));
  return listed;
}

/** Spellings of constellations in source tables. */
const spellings: Record<string, RegExp> = {
  GPS: /GPS/i,
  GLONASS: /GLO/i,
  Galileo: /GAL/i,
  BeiDou: /BDS|BEI|COM/i,
  QZSS: /QZS/i,
  SBAS: /SBA/i,
};

/** Whether what arrives is what the rover can use and what the source table promises. `lookedMs`: how long was looked. */
export function judgeFormats(
  stream: CheckedStream,
  expected: CorrectionFormat,
  listed: MountPoint | null,
  lookedMs: number,
): FormatVerdict {
  const numbers = stream.messages.map(({ number }) => number);
  const msm = numbers.filter(isMsm);
  const legacy = numbers.filter(isLegacyObservation);
  const hasStation = numbers.some(isStationMessage);
  const seen = `Messages ${numbers.join(', ')}; ${stream.constellations.join(', ') || 'no observations'}.`;
  const warnings = comparedWithTable(stream, listed, lookedMs);
  const fail = (what: string, toTry: string): FormatVerdict => ({
    passed: false,
    seen: `${what} ${seen}`,
    toTry,
    warnings,
  });
  if (msm.length + legacy.length === 0)
    return fail(
      'No observations that RTK could use arrive.',
      'Choose a mount point with MSM (1071 and up) or legacy observations (1001 to 1012).',
    );
  if (expected === 'msm' && msm.length === 0)
    return fail(
      'MSM messages were expected, and legacy ones arrive.',
      'Choose the mount point of this base that sends MSM, or set the rover to the legacy messages.',
    );
  if (expected === 'legacy' && legacy.length === 0)
    return fail(
      'Legacy messages were expected, and MSM arrive.',
      'Choose the mount point of this base that sends legacy messages, or set the rover to MSM.',
    );
  if (!hasStation)
    return fail(
      `No base position (message 1005 or 1006) came in ${Math.round(lookedMs / 1000)} s.`,
      'A rover cannot fix without it. Ask the operator, or choose another mount point.',
    );
  return { passed: true, seen, toTry: '', warnings };
}

function comparedWithTable(stream: CheckedStream, listed: MountPoint | null, lookedMs: number): string[] {
  if (!listed) return [];
  const warnings: string[] = [];
  const promised = listedMessages(listed.formatDetails);
  const arrived = new Set(stream.messages.map(({ number }) => number));
  // 1005/1006 in a table means one of the two.
  if (arrived.has(1005) || arrived.has(1006)) {
    promised.delete(1005);
    promised.delete(1006);
  }
  const missing = [...promised]
    .filter(([number, period]) => !arrived.has(number) && (period ?? 0) * 1000 * 2 < lookedMs)
    .map(([number]) => number);
  if (missing.length > 0)
    warnings.push(`the source table lists ${missing.join(', ')}, which did not come in this time`);
  for (const name of stream.constellations) {
    const pattern = spellings[name];
    if (listed.constellations && pattern && !pattern.test(listed.constellations))
      warnings.push(`${name} arrives and is not in the source table`);
  }
  for (const [name, pattern] of Object.entries(spellings))
    if (
      listed.constellations &&
      pattern.test(listed.constellations) &&
      !stream.constellations.includes(name) &&
      name !== 'SBAS'
    )
      warnings.push(`the source table has ${name}, which does not arrive`);
  return warnings;
}
