import { enuOf } from '@hubtack/contracts/geodesy/enu.js';
import { mean, standardDeviation } from '../common/statistics.js';
import type { Epoch } from '../fixes/epoch.js';

type Placed = Pick<Epoch, 'time' | 'latitude' | 'longitude' | 'altitudeM' | 'geoidSeparationM'>;

export interface MeanPosition {
  epochs: number;
  firstAt: number;
  lastAt: number;
  latitude: number;
  longitude: number;
  /** Antenna above the geoid, metres; null unless every epoch says so. */
  altitudeM: number | null;
  geoidSeparationM: number | null;
  /** Standard deviations of single epochs, metres; null with fewer than two. */
  scatter: { eastM: number; northM: number; upM: number | null } | null;
}

const allOf = (values: readonly (number | null)[]): number[] | null => {
  const known = values.filter((value) => value !== null);
  return known.length === values.length ? known : null;
};

/** The same meridian, within half a turn of another: -179.9° is 180.1° beside 179.9°. */
const nearTo = (longitude: number, other: number): number =>
  longitude - 360 * Math.round((longitude - other) / 360);

/**
 * Mean of some epochs of one pole that stands still, in order of time, and how they scatter about it in the local frame. Degrees
 * may be averaged as they are: over the metres that they lie apart they are straight. Null without a position.
 */
export function meanPosition(epochs: readonly Placed[]): MeanPosition | null {
  const latitudes = allOf(epochs.map(({ latitude }) => latitude));
  const known = allOf(epochs.map(({ longitude }) => longitude));
  if (epochs.length === 0 || !latitudes || !known) return null;
  const longitudes = known.map((longitude) => nearTo(longitude, known[0]!));
  const altitudes = allOf(epochs.map(({ altitudeM }) => altitudeM));
  const separations = allOf(epochs.map(({ geoidSeparationM }) => geoidSeparationM));
  const latitude = mean(latitudes)!;
  const longitude = nearTo(mean(longitudes)!, 0);
  const offsets = latitudes.map((phi, index) =>
    enuOf({ latitude: phi, longitude: longitudes[index]!, heightM: 0 }, { latitude, longitude, heightM: 0 }),
  );
  const eastM = standardDeviation(offsets.map((offset) => offset.eastM));
  const northM = standardDeviation(offsets.map((offset) => offset.northM));
  return {
    epochs: epochs.length,
    firstAt: epochs[0]!.time,
    lastAt: epochs.at(-1)!.time,
    latitude,
    longitude,
    altitudeM: altitudes && mean(altitudes),
    geoidSeparationM: separations && mean(separations),
    scatter:
      eastM === null || northM === null
        ? null
        : { eastM, northM, upM: altitudes && standardDeviation(altitudes) },
  };
}
