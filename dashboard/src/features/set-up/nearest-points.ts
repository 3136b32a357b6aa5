import type { ControlPoint } from '@hubtack/contracts/control-points/control-point.js';
import { enuOf } from '@hubtack/contracts/geodesy/enu.js';

export interface NearPoint extends ControlPoint {
  /** In plan, metres; null when nobody knows where the rover is. */
  distanceM: number | null;
}

/** Control points in use, the nearest first; by name where the rover is not known. */
export function nearestPoints(
  points: readonly ControlPoint[],
  place: { latitude: number | null; longitude: number | null } | undefined,
): NearPoint[] {
  const known =
    place?.latitude != null && place.longitude !== null
      ? { latitude: place.latitude, longitude: place.longitude, heightM: 0 }
      : null;
  return points
    .filter(({ active }) => active)
    .map((point) => {
      if (!known) return { ...point, distanceM: null };
      const { eastM, northM } = enuOf({ ...point, heightM: 0 }, known);
      return { ...point, distanceM: Math.hypot(eastM, northM) };
    })
    .toSorted((a, b) => (a.distanceM ?? 0) - (b.distanceM ?? 0) || a.name.localeCompare(b.name));
}
