import type { Me } from '@hubtack/contracts/auth/sign-in.js';
import { BASE_MOVED_M, type CheckedBase } from '@hubtack/contracts/corrections/check.js';

const FEET_A_METRE = 1 / 0.3048;
/** A height or a shift in the firm's units, to the millimetre or a thousandth of a foot. */
export const fineLength = (metres: number, units: Me['units']): string =>
  units === 'feet' ? `${(metres * FEET_A_METRE).toFixed(3)} ft` : `${metres.toFixed(3)} m`;

/** A precision: whole millimetres, or hundredths of a foot. */
const precision = (mm: number, units: Me['units']): string =>
  units === 'feet' ? `${((mm / 1000) * FEET_A_METRE).toFixed(2)} ft` : `${Math.round(mm)} mm`;

/** How far the rule of thumb for a single base is believed (common practice, no source). */
const RULE_HOLDS_M = 30_000;

/** What can be expected at the distance of the work; null where nobody asked from where, or the base is virtual. */
export function expectedWords(base: CheckedBase, units: Me['units']): string | null {
  const { distanceM, horizontalMm, verticalMm } = base;
  if (distanceM === null || horizontalMm === null || verticalMm === null) return null;
  if (distanceM > RULE_HOLDS_M) return 'too far for a single base';
  return `${precision(horizontalMm, units)} horizontal, ${precision(verticalMm, units)} vertical`;
}

/** Degrees with eight decimals: about a millimetre. */
export const degrees = (latitude: number, longitude: number): string =>
  `${Math.abs(latitude).toFixed(8)}° ${latitude < 0 ? 'S' : 'N'}, ${Math.abs(longitude).toFixed(8)}° ${longitude < 0 ? 'W' : 'E'}`;

/** What must not be overlooked about a base: that it is another one than at the check before, or stands elsewhere. */
export function baseAlarms(base: CheckedBase, units: Me['units']): string[] {
  const alarms: string[] = [];
  if (base.stationBefore !== null && base.stationBefore !== base.stationId)
    alarms.push(
      `Another base: station ${base.stationId}, where the check before read ${base.stationBefore}.`,
    );
  if (base.movedM !== null && base.movedM > BASE_MOVED_M)
    alarms.push(`The base stands ${fineLength(base.movedM, units)} from where the check before read it.`);
  return base.isVirtual ? [] : alarms;
}
