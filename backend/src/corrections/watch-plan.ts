const MINUTE_MS = 60_000;
/** A first failure is looked at again this soon: one look may have failed for reasons of the way there. */
const SECOND_LOOK_MS = MINUTE_MS;
/** Multiples of the golden ratio's fraction lie evenly in an interval, however many there are. */
const GOLDEN = (Math.sqrt(5) - 1) / 2;

export interface WatchedSource {
  id: number;
  watchMinutes: number;
  /** The caster has refused the login: nothing is asked by itself until it is changed. */
  isRefused: boolean;
  isDown: boolean;
  /** Its newest check, by hand or by the timetable; null when it never had one. */
  last: { startedAt: number; saysDown: boolean } | null;
}

/** Whether a source is due for a look of the timetable at `now`, ms UTC. Sources of one interval come at different moments of it. */
export function isDue({ id, watchMinutes, isRefused, isDown, last }: WatchedSource, now: number): boolean {
  if (isRefused) return false;
  const interval = watchMinutes * MINUTE_MS;
  const phase = Math.floor(((id * GOLDEN) % 1) * interval);
  const turn = Math.floor((now - phase) / interval) * interval + phase;
  if (last === null || last.startedAt < turn) return true;
  return last.saysDown && !isDown && now - last.startedAt >= SECOND_LOOK_MS;
}
