import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { MountPointOptions } from './mount-point.js';

/** The demo firm's login at the demo's caster: no secret. The demo's seed has the same. */
const login = { user: 'pennywort', password: 'field-book-2026' };
const recording = (): Uint8Array =>
  readFileSync(fileURLToPath(new URL('../../recordings/aamakinen.rtcm3', import.meta.url)));

/** Bases of the demo firm (invented), at the places of its seed. */
export const demoMountPoints = (): MountPointOptions[] => [
  {
    name: 'TANF00',
    identifier: 'Tannery Flats',
    stream: { kind: 'msm' },
    latitude: -41.4312,
    longitude: 147.1284,
    heightM: 41.3,
    stationId: 101,
    login,
  },
  {
    name: 'MILR00',
    identifier: 'Mill Race',
    stream: { kind: 'msm' },
    latitude: -41.5033,
    longitude: 147.1902,
    heightM: 164.9,
    stationId: 102,
    antennaHeightM: 1.5,
    login,
  },
  {
    name: 'QUARB2',
    identifier: 'Quarry Bend',
    stream: { kind: 'msm' },
    latitude: -41.3901,
    longitude: 147.2511,
    heightM: 212.6,
    stationId: 103,
    login,
  },
  {
    name: 'SALT00',
    identifier: 'Saltmarsh',
    stream: { kind: 'msm' },
    latitude: -41.3207,
    longitude: 147.0551,
    heightM: 6.2,
    stationId: 104,
    login,
  },
  {
    name: 'SALT01',
    identifier: 'Saltmarsh, older messages',
    stream: { kind: 'legacy' },
    latitude: -41.3207,
    longitude: 147.0551,
    heightM: 6.2,
    stationId: 105,
    login,
  },
  {
    name: 'TASNET',
    identifier: 'Network, virtual base',
    stream: { kind: 'msm' },
    latitude: -41.44,
    longitude: 147.14,
    stationId: 200,
    isNetwork: true,
    login,
  },
  {
    name: 'RECORD',
    identifier: 'Recorded base',
    country: 'FIN',
    stream: { kind: 'recording', bytes: recording() },
    latitude: 63.35665315,
    longitude: 23.35591775,
    heightM: 93.761,
    stationId: 0,
  },
];
