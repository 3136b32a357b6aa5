import { causeLabels, type ConfirmedCause } from '@hubtack/contracts/lost-fixes/cause.js';
import { percent } from '@hubtack/contracts/fixes/percent.js';
import type { WeekSum } from './shift-figures.repository.js';

/** Lost time of one cause, where it has to do with corrections of one mount point. */
export interface LostGroup {
  cause: ConfirmedCause;
  mountPoint: string | null;
  lostMs: number;
}

const ofMountPoint = new Set<ConfirmedCause>(['mountPointDown', 'correctionsStopped', 'baseStationFault']);

/** Causes that have to do with corrections are told by mount point, the others together. */
export const groupKeyOf = (cause: ConfirmedCause, mountPoint: string | null): string =>
  ofMountPoint.has(cause) ? `${cause} ${mountPoint ?? ''}` : cause;

const hours = (ms: number): string => {
  const minutes = Math.floor(ms / 60_000);
  return minutes < 60 ? `${minutes} min` : `${Math.floor(minutes / 60)} h ${minutes % 60} min`;
};

function change(now: WeekSum, before: WeekSum): string {
  if (before.onShiftMs === 0 || now.onShiftMs === 0) return '';
  const points = (100 * now.fixedMs) / now.onShiftMs - (100 * before.fixedMs) / before.onShiftMs;
  const size = Math.abs(points).toFixed(1);
  if (size === '0.0') return ', as in the four weeks before';
  return `, ${size} points ${points < 0 ? 'down' : 'up'} on the four weeks before`;
}

/** The week in one sentence: how much, against before, what it came to, and the largest reason. */
export function weekSentence(
  week: string,
  sum: WeekSum,
  fourBefore: WeekSum,
  largest: LostGroup | null,
): string {
  const name = `Week ${Number(week.slice(6))}`;
  if (sum.onShiftMs === 0) return `${name}: no shift was worked.`;
  const without = sum.onShiftMs - sum.fixedMs;
  const first = `${name}: ${percent(sum.fixedMs, sum.onShiftMs)} fix uptime${change(sum, fourBefore)}`;
  if (without === 0) return `${first}; no paid time without a fix.`;
  const time = `${first}; ${hours(without)} of paid time without a fix`;
  if (!largest || largest.lostMs === 0) return `${time}.`;
  const label = causeLabels[largest.cause].toLowerCase().replace(' for everyone on a mount point', '');
  const where = ofMountPoint.has(largest.cause) && largest.mountPoint ? ` at ${largest.mountPoint}` : '';
  const share = Math.min(100, Math.round((100 * largest.lostMs) / without));
  return `${time}, ${share} % of it ${label}${where}.`;
}
