import geodesic from 'geographiclib-geodesic';

/** Length of the geodesic on WGS 84, metres (Karney 2013, doi 10.1007/s00190-012-0578-z). Degrees in. */
export function baseDistance(
  latitude: number,
  longitude: number,
  toLatitude: number,
  toLongitude: number,
): number {
  const { s12 } = geodesic.Geodesic.WGS84.Inverse(latitude, longitude, toLatitude, toLongitude);
  return Math.round(s12!);
}
