import { ecefOf, geodeticOf } from '@hubtack/contracts/geodesy/ecef.js';
import { enuOf, enuOfEcef } from '@hubtack/contracts/geodesy/enu.js';
import geodesic from 'geographiclib-geodesic';
import { assert, integer, property } from 'fast-check';
import proj4 from 'proj4';
import { describe, expect, it } from 'vitest';

const degrees = (whole: number, minutes: number, seconds: number): number =>
  Math.sign(whole) * (Math.abs(whole) + minutes / 60 + seconds / 3600);

/** Evenly spread, which doubles of fast-check are not: most of those are next to nothing. */
const between = (least: number, most: number, digits: number) =>
  integer({ min: least * 10 ** digits, max: most * 10 ** digits }).map((whole) => whole / 10 ** digits);

/** IOGP Publication 373-7-2 (EPSG Guidance Note 7-2), method 9602, WGS 84. */
const example = {
  place: { latitude: degrees(53, 48, 33.82), longitude: degrees(2, 7, 46.38), heightM: 73 },
  ecef: { x: 3771793.968, y: 140253.342, z: 5124304.349 },
};

describe('geodetic and earth-centred coordinates', () => {
  it('agree with the worked example of method 9602 to a millimetre', () => {
    const ecef = ecefOf(example.place);
    expect(ecef.x).toBeCloseTo(example.ecef.x, 2.9);
    expect(ecef.y).toBeCloseTo(example.ecef.y, 2.9);
    expect(ecef.z).toBeCloseTo(example.ecef.z, 2.9);
    const place = geodeticOf(example.ecef);
    expect(place.latitude).toBeCloseTo(example.place.latitude, 8);
    expect(place.longitude).toBeCloseTo(example.place.longitude, 8);
    expect(place.heightM).toBeCloseTo(73, 2.9);
  });
  it('agree with the proj4 package to a tenth of a millimetre', () => {
    const geocentric = proj4('+proj=longlat +datum=WGS84 +no_defs', '+proj=geocent +datum=WGS84 +units=m');
    assert(
      property(
        between(-90, 90, 9),
        between(-180, 180, 9),
        between(-500, 9000, 4),
        (latitude, longitude, heightM) => {
          const [x, y, z] = geocentric.forward<[number, number, number]>([longitude, latitude, heightM]);
          const ours = ecefOf({ latitude, longitude, heightM });
          expect(Math.hypot(ours.x - x, ours.y - y, ours.z - z)).toBeLessThan(1e-4);
          const [east, north, up] = geocentric.inverse<[number, number, number]>([x, y, z]);
          const theirs = ecefOf({ latitude: north, longitude: east, heightM: up });
          const back = ecefOf(geodeticOf({ x, y, z }));
          expect(Math.hypot(back.x - theirs.x, back.y - theirs.y, back.z - theirs.z)).toBeLessThan(1e-4);
        },
      ),
      { numRuns: 500 },
    );
  });
});

describe('east, north, up', () => {
  // IOGP Publication 373-7-2, methods 9836 and 9837; also in the PROJ manual, "topocentric".
  const origin = { latitude: 55, longitude: 5, heightM: 200 };
  const expected = { eastM: -189013.869, northM: -128642.04, upM: -4220.171 };
  it('agrees with the worked example of methods 9836 and 9837', () => {
    for (const found of [enuOfEcef(example.ecef, origin), enuOf(example.place, origin)]) {
      expect(found.eastM).toBeCloseTo(expected.eastM, 2.9);
      expect(found.northM).toBeCloseTo(expected.northM, 2.9);
      expect(found.upM).toBeCloseTo(expected.upM, 2.9);
    }
    const from = ecefOf(origin);
    expect(from.x).toBeCloseTo(3652755.3058, 4);
    expect(from.y).toBeCloseTo(319574.6799, 4);
    expect(from.z).toBeCloseTo(5201547.3536, 4);
  });
  it('of a point that is 1 km off drops below the tangent plane by d²/2R', () => {
    // R 6371 km.
    const north = geodesic.Geodesic.WGS84.Direct(45, 10, 0, 1000);
    const { upM } = enuOf(
      { latitude: north.lat2!, longitude: north.lon2!, heightM: 0 },
      { latitude: 45, longitude: 10, heightM: 0 },
    );
    expect(upM).toBeCloseTo(-(1000 ** 2) / (2 * 6_371_000), 3);
  });
});

describe('geodesics of the geographiclib-geodesic package, which distances to bases come from', () => {
  const inverse = (from: [number, number], to: [number, number]) =>
    geodesic.Geodesic.WGS84.Inverse(from[0], from[1], to[0], to[1]);
  it('Flinders Peak to Buninyong (GDA Technical Manual, sample for Vincenty): 54972.271 m', () => {
    const found = inverse(
      [degrees(-37, 57, 3.7203), degrees(144, 25, 29.5244)],
      [degrees(-37, 39, 10.1561), degrees(143, 55, 35.3839)],
    );
    expect(found.s12).toBeCloseTo(54972.271, 2.9);
    expect((found.azi1! + 360) % 360).toBeCloseTo(degrees(306, 52, 5.37), 5);
    // Seen from the other end.
    expect((found.azi2! + 180) % 360).toBeCloseTo(degrees(127, 10, 25.07), 5);
  });
  it('the same sample, direct', () => {
    const [latitude, longitude] = [degrees(-37, 57, 3.7203), degrees(144, 25, 29.5244)];
    const found = geodesic.Geodesic.WGS84.Direct(latitude, longitude, degrees(306, 52, 5.37), 54972.271);
    expect(found.lat2).toBeCloseTo(degrees(-37, 39, 10.1561), 7.5);
    expect(found.lon2).toBeCloseTo(degrees(143, 55, 35.3839), 7.5);
  });
  it('JFK to LHR (GeographicLib manual): 5551.76 km', () => {
    expect(inverse([40.6, -73.8], [51.6, -0.5]).s12! / 1000).toBeCloseTo(5551.76, 2);
  });
  it('one degree, north and east of 0, 0 (computed with GeographicLib 2.1.2)', () => {
    expect(inverse([0, 0], [1, 0]).s12).toBeCloseTo(110574.3886, 4);
    expect(inverse([0, 0], [0, 1]).s12).toBeCloseTo(111319.4908, 4);
  });
  it('Wellington to Salamanca (README of geographiclib-geodesic): 19959679.267 m', () => {
    expect(inverse([-41.32, 174.81], [40.96, -5.5]).s12).toBeCloseTo(19959679.267, 2.9);
  });
  it('JFK to Singapore (GeodSolve manual): 15347628 m', () => {
    const found = inverse(
      [degrees(40, 38, 23), degrees(-73, 46, 44)],
      [degrees(1, 21, 33), degrees(103, 59, 22)],
    );
    expect(found.s12).toBeCloseTo(15347628, -0.2);
    expect(found.azi1).toBeCloseTo(degrees(3, 18, 29.9), 4);
    expect(found.azi2).toBeCloseTo(degrees(177, 29, 9.2), 4);
  });
  it('nearly antipodal points converge (Karney 2013 discusses the region): 19936288.578965 m', () => {
    expect(inverse([0, 0], [0.5, 179.5]).s12).toBeCloseTo(19936288.578965, 5);
  });
});
