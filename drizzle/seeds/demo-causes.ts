import type { ConfirmedCause } from '@hubtack/contracts/lost-fixes/cause.js';

/** Shares of the demo's past: invented. A few stay unconfirmed, as in any office. */
const shares: [ConfirmedCause | null, number][] = [
  ['skyBlocked', 0.34],
  ['correctionsStopped', 0.26],
  ['wentQuiet', 0.12],
  ['notResolving', 0.1],
  ['equipment', 0.05],
  ['noPosition', 0.03],
  [null, 0.1],
];

/** The same lost fix gets the same cause at every seeding. Tannery Flats has trouble with its base station. */
export function demoCauseOf(id: number, mountPoint: string | null): ConfirmedCause | null {
  const share = (Math.imul(id, 2_654_435_761) >>> 0) / 2 ** 32;
  if (mountPoint?.startsWith('TANF') && share < 0.45) return 'baseStationFault';
  let sum = 0;
  for (const [cause, part] of shares) {
    sum += part;
    if (share < sum) return cause;
  }
  return null;
}
