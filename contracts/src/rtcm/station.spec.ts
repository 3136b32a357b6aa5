import { assert, integer, option, property, record, boolean } from 'fast-check';
import { expect, it } from 'vitest';
import { readStation, writeStation, type Station } from './station.js';

/** All that 38 bits can say. */
const coordinate = integer({ min: -(2 ** 37), max: 2 ** 37 - 1 }).map((units) => units / 10_000);
const station = record<Station>({
  stationId: integer({ min: 0, max: 4095 }),
  isVirtual: boolean(),
  x: coordinate,
  y: coordinate,
  z: coordinate,
  antennaHeightM: option(integer({ min: 0, max: 65_535 }).map((units) => units / 10_000)),
});

it('a station is read as it was written, to a tenth of a millimetre', () => {
  assert(
    property(station, (written) => {
      const read = readStation(writeStation(written))!;
      expect(read).toEqual({
        ...written,
        x: expect.closeTo(written.x, 5),
        y: expect.closeTo(written.y, 5),
        z: expect.closeTo(written.z, 5),
        antennaHeightM: written.antennaHeightM === null ? null : expect.closeTo(written.antennaHeightM, 5),
      });
    }),
  );
});
it('any other message, and one that is cut, is none', () => {
  const payload = writeStation({ stationId: 1, isVirtual: false, x: 1, y: 2, z: 3, antennaHeightM: null });
  expect(readStation(payload.subarray(0, 18))).toBeNull();
  expect(readStation(Uint8Array.of(0x43, 0x50, 0, 0))).toBeNull();
  expect(readStation(new Uint8Array(0))).toBeNull();
});
it('the ends of 38 bits keep their sign', () => {
  const [least, most] = [-(2 ** 37) / 10_000, (2 ** 37 - 1) / 10_000];
  const far = { stationId: 4095, isVirtual: true, x: least, y: most, z: -0.0001, antennaHeightM: 6.5535 };
  expect(readStation(writeStation(far))).toEqual(far);
});
