import { baseDistance } from '../common/base-distance.js';

/** Where a rover was at an instant (ms UTC), degrees. */
export interface TimedPlace {
  time: number;
  latitude: number;
  longitude: number;
}
export interface PlacedSite {
  name: string;
  latitude: number;
  longitude: number;
}
export interface SiteVisit {
  siteName: string;
  start: number;
  end: number;
}

/** A rover this near to a site is at it (common practice, no source). */
const AT_SITE_M = 1000;
/** Out of sight or switched off for shorter: still the same visit. */
const GAP_MS = 45 * 60_000;
/** Shorter is driving past. */
const LEAST_MS = 5 * 60_000;

/** Sites that a rover was at, in order of time: the nearest one within a kilometre. `places`: sorted by time. */
export function siteVisits(places: readonly TimedPlace[], sites: readonly PlacedSite[]): SiteVisit[] {
  const visits: SiteVisit[] = [];
  for (const place of places) {
    const siteName = nearest(place, sites);
    if (siteName === null) continue;
    const last = visits.at(-1);
    if (last?.siteName === siteName && place.time - last.end <= GAP_MS) last.end = place.time;
    else visits.push({ siteName, start: place.time, end: place.time });
  }
  return visits.filter(({ start, end }) => end - start >= LEAST_MS);
}

function nearest({ latitude, longitude }: TimedPlace, sites: readonly PlacedSite[]): string | null {
  let best: { name: string; distanceM: number } | null = null;
  for (const site of sites) {
    const distanceM = baseDistance(latitude, longitude, site.latitude, site.longitude);
    if (distanceM <= AT_SITE_M && (best === null || distanceM < best.distanceM))
      best = { name: site.name, distanceM };
  }
  return best?.name ?? null;
}
