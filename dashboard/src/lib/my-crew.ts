import { crewDay, type CrewDayView } from '@hubtack/contracts/shifts/shift.js';
import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { problem } from '@hubtack/contracts/errors/problem.js';
import { queryOptions, type QueryClient } from '@tanstack/react-query';
import { ApiError, refreshSignIn } from './api';

/** The day, and of when it is: without signal the phone answers from what it kept. */
export interface DatedDay {
  day: CrewDayView;
  /** The server's clock when it answered. */
  asOf: number;
  isKept: boolean;
}

/** Set by the service worker on answers that it had kept. */
const KEPT_HEADER = 'x-hubtack-kept';

async function read(path: string): Promise<Response> {
  const once = () =>
    fetch(path, { credentials: 'same-origin' }).catch((cause: unknown) => {
      throw Object.assign(new ApiError('offline', 'The server cannot be reached.'), { cause });
    });
  const response = await once();
  return response.status === 401 && (await refreshSignIn()) ? once() : response;
}

export const crewDayPath = (crewId: number) => `/api/crews/${crewId}/day`;

async function readDay(crewId: number): Promise<DatedDay> {
  const response = await read(crewDayPath(crewId));
  const body: unknown = await response.json().catch(() => null);
  const refusal = problem.safeParse(body);
  if (!response.ok && refusal.success)
    throw new ApiError(refusal.data.code, refusal.data.detail ?? refusal.data.title, refusal.data);
  const day = crewDay.safeParse(body);
  if (!response.ok || !day.success)
    throw new ApiError(
      'badAnswer',
      `The server answers ${response.status} in a form this page does not know.`,
    );
  const date = Date.parse(response.headers.get('date') ?? '');
  return {
    day: day.data,
    asOf: Number.isNaN(date) ? Date.now() : date,
    isKept: response.headers.has(KEPT_HEADER),
  };
}

const REREAD_MS = 5000;

const dayKey = (crewId: number) => ['crewDay', crewId] as const;

export const crewDayQuery = (crewId: number) =>
  queryOptions({
    queryKey: dayKey(crewId),
    queryFn: async ({ client }): Promise<DatedDay> => {
      const read = await readDay(crewId);
      // What this page knows is never older than what was kept, and may have answers to taps in it.
      const known = read.isKept ? client.getQueryData<DatedDay>(dayKey(crewId)) : undefined;
      return known ? { ...known, isKept: true } : read;
    },
    refetchInterval: REREAD_MS,
    refetchOnWindowFocus: 'always',
    // Without signal the service worker answers, so there is always something to ask.
    networkMode: 'always',
    retry: false,
  });

/** A change that the server has answered for is on screen before the next reading, and no older answer overtakes it. */
async function changeDay(client: QueryClient, crewId: number, change: (day: CrewDayView) => CrewDayView) {
  const { queryKey } = crewDayQuery(crewId);
  await client.cancelQueries({ queryKey });
  client.setQueryData(queryKey, (before) => before && { ...before, day: change(before.day) });
}

export const putDay = (client: QueryClient, day: CrewDayView): Promise<void> =>
  changeDay(client, day.crewId, () => day);

export const putLostFix = (client: QueryClient, crewId: number, lostFix: LostFix): Promise<void> =>
  changeDay(client, crewId, (day) => ({
    ...day,
    lostFixes: [...day.lostFixes.filter(({ id }) => id !== lostFix.id), lostFix],
  }));
