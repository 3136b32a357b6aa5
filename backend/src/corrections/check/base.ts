import type { CheckedBase } from '@hubtack/contracts/corrections/check.js';
import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import { ecefOf, geodeticOf } from '@hubtack/contracts/geodesy/ecef.js';
import type { Station } from '@hubtack/contracts/rtcm/station.js';
import { baseDistance } from '../../common/base-distance.js';

export interface BaseBefore {
  stationId: number;
  latitude: number;
  longitude: number;
  heightM: number;
}

/** Single base up to 30 km, one sigma: 8 mm + 1 ppm in plan, 15 mm + 1 ppm in height (common practice, no source); a sum, in mm. */
export const expectedPrecision = (distanceM: number): { horizontalMm: number; verticalMm: number } => ({
  horizontalMm: 8 + distanceM / 1000,
  verticalMm: 15 + distanceM / 1000,
});

/** The base as its message 1005 or 1006 has it, against where it was at the check before. */
export function checkedBase(
  station: Station,
  listed: MountPoint | null,
  place: { latitude: number; longitude: number } | null,
  before: BaseBefore | null,
): CheckedBase {
  const { latitude, longitude, heightM } = geodeticOf(station);
  const isVirtual = station.isVirtual || listed?.isNetwork === true;
  const distanceM = place && baseDistance(place.latitude, place.longitude, latitude, longitude);
  const precision =
    distanceM === null || isVirtual ? { horizontalMm: null, verticalMm: null } : expectedPrecision(distanceM);
  return {
    stationId: station.stationId,
    latitude,
    longitude,
    heightM,
    antennaHeightM: station.antennaHeightM,
    isVirtual,
    distanceM,
    ...precision,
    movedM: before && !isVirtual ? movedBy(station, before) : null,
    stationBefore: before && !isVirtual && before.stationId !== station.stationId ? before.stationId : null,
  };
}

function movedBy(station: Station, before: BaseBefore): number {
  const from = ecefOf(before);
  return Math.hypot(station.x - from.x, station.y - from.y, station.z - from.z);
}
