import type { CrewDayView } from '@hubtack/contracts/shifts/shift.js';

const HOUR_MS = 3_600_000;
/** The shortest stretch that the ribbon shows, so that the first minutes of a day are not a wide block. */
const SHORTEST_MS = 2 * HOUR_MS;

/** From the full hour before the shift, or before the first sentence, to now; inside the day. */
export function ribbonWindow(
  day: Pick<CrewDayView, 'dayStart' | 'dayEnd' | 'onShift' | 'rovers'>,
  now: number,
): { from: number; to: number } {
  const to = Math.min(day.dayEnd, now);
  const starts = [
    ...day.onShift.map(({ start }) => start),
    ...day.rovers.flatMap(({ spans }) => spans.slice(0, 1).map(({ start }) => start)),
  ].filter((start) => start < to);
  const first = Math.min(...starts, to - SHORTEST_MS);
  const sinceMidnight = Math.floor((first - day.dayStart) / HOUR_MS) * HOUR_MS;
  return { from: day.dayStart + Math.max(0, sinceMidnight), to: Math.max(to, day.dayStart + 1) };
}
