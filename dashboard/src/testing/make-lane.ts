import type { Lane } from '@hubtack/contracts/board/lane.js';

/** A lane that is well; a test says only what matters. */
export const makeLane = (change: Partial<Lane> = {}): Lane => ({
  id: 1,
  state: 'fixed',
  since: 0,
  heldUntil: 1_010_000,
  lastEpochAt: 1_000_000,
  satellites: 22,
  ageMs: 1000,
  hdop: 0.7,
  stationId: 1,
  latitude: null,
  longitude: null,
  baseDistanceM: null,
  duty: 'onShift',
  today: { fixedMs: 900_000, floatMs: 100_000, codeMs: 0, noneMs: 0, silentMs: 0 },
  todayAsOf: 1_000_000,
  ribbon: [{ state: 'fixed', start: 0, end: 1_010_000 }],
  roverLabel: 'R-01',
  crewId: 1,
  crewName: 'Alder',
  crewPhone: null,
  siteName: 'Tannery Flats',
  mountPoint: 'TANF00',
  pauses: [],
  ...change,
});
