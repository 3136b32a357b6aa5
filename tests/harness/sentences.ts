import { writeGga } from '@hubtack/contracts/nmea/sentence-writer.js';

/** A GGA as a rover at work writes it; a test says only what matters. */
export const gga = (
  time: number,
  quality = 4,
  change: Partial<Parameters<typeof writeGga>[0]> = {},
): string =>
  writeGga({
    time,
    latitude: -41.44,
    longitude: 147.14,
    quality,
    satellites: 22,
    hdop: 0.7,
    altitudeM: 40,
    geoidSeparationM: -3,
    ageSeconds: 1,
    stationId: 1,
    ...change,
  });
