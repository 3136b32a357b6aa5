import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

export const recordingFile = (name: string): string =>
  fileURLToPath(new URL(`../fixtures/${name}`, import.meta.url));
export const recording = (name: string): Buffer => readFileSync(recordingFile(name));

/** What the two recordings must give on a rover's timeline: counted from the files, and hand-checked in the issue. */
export const published = {
  walk: {
    file: 'walk-rtk-fixed-float.nmea',
    epochs: 536,
    from: '2025-08-28T17:30:21.750Z',
    to: '2025-08-28T17:32:35.500Z',
    totals: { fixedMs: 87_250, floatMs: 46_500, codeMs: 0, noneMs: 0, silentMs: 0 },
    changes: ['2025-08-28T17:30:35.000Z', '2025-08-28T17:30:36.000Z', '2025-08-28T17:31:50.000Z'],
  },
  rtkLog: {
    file: 'nmea-rtk.log',
    epochs: 122,
    from: '2020-03-18T13:28:19.600Z',
    to: '2020-03-18T13:39:01.500Z',
    totals: { fixedMs: 1700, floatMs: 0, codeMs: 20_300, noneMs: 0, silentMs: 619_900 },
    changes: ['2020-03-18T13:28:39.900Z', '2020-03-18T13:38:59.800Z'],
  },
} as const;
