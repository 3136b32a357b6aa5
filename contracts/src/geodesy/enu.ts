import { ecefOf, type Ecef, type Geodetic } from './ecef.js';

/** Metres in the local frame at the origin. */
export interface Enu {
  eastM: number;
  northM: number;
  upM: number;
}

const RADIANS = Math.PI / 180;

/**
 * A point in the topocentric frame at `origin` (IOGP Publication 373-7-2, method 9836). "Up" is along the normal at the origin: farther
 * away than some hundred metres it is no difference of heights any more.
 */
export function enuOfEcef(point: Ecef, origin: Geodetic): Enu {
  const from = ecefOf(origin);
  const [dx, dy, dz] = [point.x - from.x, point.y - from.y, point.z - from.z];
  const phi = origin.latitude * RADIANS;
  const lambda = origin.longitude * RADIANS;
  const [sinPhi, cosPhi, sinLambda, cosLambda] = [
    Math.sin(phi),
    Math.cos(phi),
    Math.sin(lambda),
    Math.cos(lambda),
  ];
  return {
    eastM: -sinLambda * dx + cosLambda * dy,
    northM: -sinPhi * cosLambda * dx - sinPhi * sinLambda * dy + cosPhi * dz,
    upM: cosPhi * cosLambda * dx + cosPhi * sinLambda * dy + sinPhi * dz,
  };
}

/** The same from geodetic coordinates (method 9837). */
export const enuOf = (point: Geodetic, origin: Geodetic): Enu => enuOfEcef(ecefOf(point), origin);
