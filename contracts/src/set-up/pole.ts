import type { SetUpCard } from './set-up-card.js';

type Pole = Pick<SetUpCard, 'poleHeightM' | 'measuringPoint' | 'antennaOffsetM'>;

/** From the ground up to the antenna's phase centre, metres: what is taken off a height that the receiver says. */
export const antennaAboveGroundM = ({ poleHeightM, measuringPoint, antennaOffsetM }: Pole): number =>
  measuringPoint === 'mountBottom' ? poleHeightM + antennaOffsetM : poleHeightM;

/** Height of the ground under the pole, metres: above the geoid, and above the ellipsoid where the separation is known. */
export function groundHeight(
  gga: { altitudeM: number | null; geoidSeparationM: number | null },
  pole: Pole,
): { aboveGeoidM: number | null; aboveEllipsoidM: number | null } {
  const { altitudeM, geoidSeparationM } = gga;
  if (altitudeM === null) return { aboveGeoidM: null, aboveEllipsoidM: null };
  const aboveGeoidM = altitudeM - antennaAboveGroundM(pole);
  return {
    aboveGeoidM,
    aboveEllipsoidM: geoidSeparationM === null ? null : aboveGeoidM + geoidSeparationM,
  };
}

/**
 * What a pole that leans costs without tilt compensation, metres: h sin t across, h (1 - cos t) in height. `heightM`: from the
 * ground to the phase centre.
 */
export function tiltError(heightM: number, degrees: number): { horizontalM: number; verticalM: number } {
  const tilt = (degrees * Math.PI) / 180;
  return { horizontalM: heightM * Math.sin(tilt), verticalM: heightM * (1 - Math.cos(tilt)) };
}
