import type { Lane } from '@hubtack/contracts/board/lane.js';
import { againWords } from '@hubtack/contracts/set-up/check-shot.js';
import { clockTime } from './format';

/** Millimetres up to a metre, metres beyond. */
export const inMillimetres = (metres: number): string =>
  metres < 1 ? `${Math.round(metres * 1000)} mm` : `${metres.toFixed(3)} m`;

/** Millimetres with their sign, for differences: +9 mm, −12 mm. */
export const millimetres = (metres: number): string => {
  const whole = Math.round(metres * 1000);
  const sign = whole > 0 ? '+' : whole < 0 ? '−' : '';
  return `${sign}${inMillimetres(Math.abs(metres))}`;
};

export interface CheckWords {
  /** What stands on the lane. */
  short: string;
  /** The whole, for hover and for people who hear it. */
  long: string;
  /** It vouches for the rover as it stands now. */
  counts: boolean;
}

/** What a lane says of its newest check shot. */
export function checkWords(checkShot: Lane['checkShot'], zone: string): CheckWords | null {
  if (!checkShot) return null;
  const { at, horizontalMm, passed, again } = checkShot;
  const time = clockTime(at, zone);
  if (again)
    return {
      short: 'check again',
      long: `Check again: ${againWords[again]}. The last check was at ${time}, ${horizontalMm} mm off.`,
      counts: false,
    };
  return passed
    ? {
        short: `checked ${time}, ${horizontalMm} mm`,
        long: `Checked into control at ${time}, ${horizontalMm} mm off in plan.`,
        counts: true,
      }
    : {
        short: `check failed ${time}`,
        long: `The check into control at ${time} failed, ${horizontalMm} mm off in plan.`,
        counts: false,
      };
}
