import { ProblemException } from './problem.exception.js';

/** A phone whose clock is ahead means now; one that is a day ahead, nobody knows when. */
const AHEAD_MS = 24 * 3_600_000;
/** What was tapped without signal comes within this time, or not at all. */
const BEHIND_MS = 36 * 3_600_000;

/** When something was tapped, ms UTC: the time the phone says, or now. Throws 400 for a time to come, or too long ago. */
export function tapTime(at: string | undefined, now: number): number {
  if (at === undefined) return now;
  const time = Date.parse(at);
  const refuse = (detail: string) => {
    throw new ProblemException(400, 'invalidBody', detail, { errors: [{ pointer: '/at', detail }] });
  };
  if (time > now + AHEAD_MS) refuse('This time is still to come.');
  if (time < now - BEHIND_MS) refuse('This time is more than 36 hours ago.');
  return Math.min(time, now);
}
