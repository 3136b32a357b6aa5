import type { StartCheckBody } from '@hubtack/contracts/corrections/check.js';

/** `site-3`, `rover-7` or empty, as a choice and an address carry it. */
export function placeOf(choice: string): StartCheckBody {
  const [, kind, id] = /^(site|rover)-(\d+)$/.exec(choice) ?? [];
  if (kind === undefined) return {};
  return kind === 'site' ? { siteId: Number(id) } : { roverId: Number(id) };
}
