import type { LaneChange } from '@hubtack/contracts/board/lane.js';

/** Lane changes of the size that a working rover makes. */
export function laneFixtures(count: number): LaneChange[] {
  const now = Date.now();
  return Array.from({ length: count }, (_, index) => ({
    id: index + 1,
    state: 'fixed' as const,
    since: now - 1_000_000,
    heldUntil: now + 9000,
    lastEpochAt: now,
    satellites: 22,
    ageMs: 1000,
    hdop: 0.7,
    stationId: 1,
    latitude: -41.418799695666664,
    longitude: 147.10208059,
    baseDistanceM: 2596,
    duty: 'onShift' as const,
    today: { fixedMs: 7_100_000, floatMs: 45_000, codeMs: 870, noneMs: 0, silentMs: 405_973 },
    todayAsOf: now,
  }));
}
