import type { Viewer } from '../auth/access.js';
import { forbidden } from '../common/problem.exception.js';

/** Notices are for people; a display has none. */
export function personOf({ userId }: Viewer): number {
  if (userId === null) throw forbidden();
  return userId;
}
