import type { CorrectionSource } from '@hubtack/contracts/corrections/correction-source.js';
import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';

export const makeMountPoint = (mountPoint: string, change: Partial<MountPoint> = {}): MountPoint => ({
  mountPoint,
  identifier: null,
  format: 'RTCM 3.2',
  formatDetails: null,
  constellations: null,
  network: null,
  country: null,
  latitude: null,
  longitude: null,
  distanceM: null,
  wantsPosition: null,
  isNetwork: null,
  authentication: null,
  fee: null,
  bitrate: null,
  ...change,
});

export const makeSource = (change: Partial<CorrectionSource> = {}): CorrectionSource => ({
  id: 1,
  name: 'Tannery',
  address: 'caster.pennywort.example',
  port: 2101,
  mountPoint: 'TANF00',
  user: 'pennywort',
  hasPassword: true,
  ntripVersion: 2,
  tls: false,
  sendPosition: false,
  expectedFormat: 'any',
  watchMinutes: null,
  baseLatitude: null,
  baseLongitude: null,
  decodedBase: null,
  lastCheck: null,
  downSince: null,
  ...change,
});
