/** Earth-centred, earth-fixed, metres. */
export interface Ecef {
  x: number;
  y: number;
  z: number;
}
/** Degrees, north and east positive; height above the ellipsoid, metres. */
export interface Geodetic {
  latitude: number;
  longitude: number;
  heightM: number;
}

/** WGS 84 (IOGP/EPSG registry, ellipsoid 7030). */
const A = 6_378_137;
const F = 1 / 298.257223563;
const B = A * (1 - F);
const E2 = F * (2 - F);
/** Second eccentricity squared. */
const EP2 = E2 / (1 - E2);

const RADIANS = Math.PI / 180;

/** IOGP Publication 373-7-2 (EPSG Guidance Note 7-2), method 9602. */
export function ecefOf({ latitude, longitude, heightM }: Geodetic): Ecef {
  const phi = latitude * RADIANS;
  const lambda = longitude * RADIANS;
  const sin = Math.sin(phi);
  const nu = A / Math.sqrt(1 - E2 * sin * sin);
  const p = (nu + heightM) * Math.cos(phi);
  return { x: p * Math.cos(lambda), y: p * Math.sin(lambda), z: (nu * (1 - E2) + heightM) * sin };
}

/**
 * The same backwards: Bowring's formula (Survey Review XXIII 181, 1976; EPSG Guidance Note 7-2, method 9602), its parametric
 * latitude made better: a second round is enough from the ground up to satellites, a third far below as well. The height is taken
 * along the normal, which also holds at the poles. Within 43 km of the centre, where normals cross and no place is meant (a base
 * that does not know its own sends zeros), the latitude is still one.
 */
export function geodeticOf({ x, y, z }: Ecef): Geodetic {
  const p = Math.hypot(x, y);
  let beta = Math.atan2(z * A, p * B);
  let phi = 0;
  for (let round = 0; round < 3; round++) {
    const outwards = Math.max(0, p - E2 * A * Math.cos(beta) ** 3);
    phi = Math.atan2(z + EP2 * B * Math.sin(beta) ** 3, outwards);
    beta = Math.atan2((1 - F) * Math.sin(phi), Math.cos(phi));
  }
  const sin = Math.sin(phi);
  const heightM = p * Math.cos(phi) + z * sin - A * Math.sqrt(1 - E2 * sin * sin);
  return { latitude: phi / RADIANS, longitude: Math.atan2(y, x) / RADIANS, heightM };
}
