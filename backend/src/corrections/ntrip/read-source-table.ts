import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import { baseDistance } from '../../common/base-distance.js';
import { resolveOnce, type Lookup } from './addresses.js';
import { openConnection } from './connection.js';
import { NtripProblem } from './problem.js';
import { askForTable, tableOf, type TableLimits } from './table-answer.js';

export interface TableTarget {
  address: string;
  port: number;
  user: string | null;
  password: string | null;
  ntripVersion: 1 | 2;
  tls: boolean;
  allowPrivate: boolean;
  /** What distances count from. */
  place: { latitude: number; longitude: number } | null;
}

const LIMITS: TableLimits = { firstReplyMs: 10_000, tableMs: 15_000, idleMs: 3000 };
const CONNECT_MS = 8000;

/** With the distance from a place; a virtual base is nowhere. */
export function withDistances(
  mountPoints: readonly MountPoint[],
  place: { latitude: number; longitude: number } | null,
): MountPoint[] {
  return mountPoints.map((one) => {
    const isKnown = place !== null && one.latitude !== null && one.longitude !== null && !one.isNetwork;
    const distanceM = isKnown
      ? baseDistance(place.latitude, place.longitude, one.latitude!, one.longitude!)
      : null;
    return { ...one, distanceM };
  });
}

/** The mount points of a caster as its table has them. @throws NtripProblem; the signal's reason when it is aborted */
export async function fetchMountPoints(
  target: TableTarget,
  signal: AbortSignal,
  lookup?: Lookup,
): Promise<{ mountPoints: MountPoint[]; oddities: string[] }> {
  const { address, port, ntripVersion: version, user, password } = target;
  const to = await resolveOnce(address, target.allowPrivate, lookup);
  const ask = async (login: { user: string; password: string } | null) => {
    const inTime = AbortSignal.timeout(CONNECT_MS);
    const socket = await openConnection(target, to, AbortSignal.any([signal, inTime])).catch(
      (error: unknown) => {
        if (!inTime.aborted || signal.aborted) throw error;
        throw new NtripProblem(
          `${address} does not answer at port ${port}.`,
          'Check address and port; a firewall may be in the way.',
        );
      },
    );
    const request = { version, mountPoint: null, address, port, login, gga: null };
    return tableOf(await askForTable(socket, request, LIMITS, signal), address);
  };
  let found = await ask(null);
  if (found.table === null && user !== null && password !== null) found = await ask({ user, password });
  if (found.table === null)
    throw new NtripProblem(
      `There is no list of mount points: ${found.warnings.join('; ')}.`,
      'Ask the operator.',
    );
  return { mountPoints: withDistances(found.table.mountPoints, target.place), oddities: found.warnings };
}
