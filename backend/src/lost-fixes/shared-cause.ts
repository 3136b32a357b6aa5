/** A rover on a mount point, as seen at one instant. */
export interface MountPointRover {
  roverId: number;
  mountPoint: string;
  /** On shift, not paused, and heard within the hold time. */
  isReporting: boolean;
  /** Since when it has been without corrections, ms UTC; null while they come. */
  lostAt: number | null;
}

/** Rovers that lose their corrections within this time of each other have lost them for one reason. */
const TOGETHER_MS = 60_000;
const LEAST_ROVERS = 2;

export interface Outage {
  /** When the first of them lost its corrections. */
  start: number;
  roverIds: number[];
}

/**
 * Whether a mount point has failed (design: "Shared cause"): two or more of its rovers, and at least half of those reporting on
 * it, lost their corrections within a minute of each other, and the last of these has been without for `lostAfterMs`, so that a short
 * dropout is none. `rovers`: those of one mount point.
 */
export function outageOf(
  rovers: readonly MountPointRover[],
  now: number,
  lostAfterMs: number,
): Outage | null {
  const reporting = rovers.filter(({ isReporting }) => isReporting);
  const lost = reporting
    .filter((rover): rover is MountPointRover & { lostAt: number } => rover.lostAt !== null)
    .toSorted((a, b) => a.lostAt - b.lostAt);
  const least = Math.max(LEAST_ROVERS, reporting.length / 2);
  for (let first = 0; first < lost.length; first++) {
    const { lostAt } = lost[first]!;
    const together = lost.slice(first).filter((rover) => rover.lostAt - lostAt <= TOGETHER_MS);
    if (together.length < least) continue;
    const decisive = together[Math.ceil(least) - 1]!;
    if (now - decisive.lostAt < lostAfterMs) continue;
    return { start: lostAt, roverIds: together.map(({ roverId }) => roverId) };
  }
  return null;
}

/** Whether an outage is over: fewer than half of those reporting on the mount point are still without corrections. */
export function isOutageOver(rovers: readonly MountPointRover[]): boolean {
  const reporting = rovers.filter(({ isReporting }) => isReporting);
  const lost = reporting.filter(({ lostAt }) => lostAt !== null);
  return lost.length === 0 || lost.length < reporting.length / 2;
}
