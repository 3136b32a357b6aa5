import {
  lostFix,
  lostFixDetail,
  lostFixList,
  people,
  type CloseBody,
  type LostFix,
  type LostFixList,
  type ShelveBody,
} from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { api } from './api';

export interface LostFixFilter {
  status: 'active' | 'closed';
  roverId?: string | undefined;
  crewId?: string | undefined;
  mountPoint?: string | undefined;
}

const listKey = ['lost-fixes'] as const;
const oneKey = (id: number) => ['lost-fix', id] as const;

function searchOf(filter: LostFixFilter, before?: number): string {
  const search = new URLSearchParams({ status: filter.status });
  for (const name of ['roverId', 'crewId', 'mountPoint'] as const)
    if (filter[name]) search.set(name, filter[name]);
  if (before !== undefined) search.set('before', String(before));
  return search.toString();
}

/** Kept up to date by the board's stream; read anew when somebody comes back to it. */
export const lostFixesQuery = (filter: LostFixFilter) =>
  queryOptions({
    queryKey: [...listKey, filter],
    queryFn: () => api(lostFixList, 'GET', `/api/lost-fixes?${searchOf(filter)}`),
  });

export const olderLostFixes = (filter: LostFixFilter, before: number | undefined): Promise<LostFixList> =>
  api(lostFixList, 'GET', `/api/lost-fixes?${searchOf(filter, before)}`);

export const lostFixQuery = (id: number) =>
  queryOptions({
    queryKey: oneKey(id),
    queryFn: () => api(lostFixDetail, 'GET', `/api/lost-fixes/${id}`),
  });

export const peopleQuery = queryOptions({
  queryKey: ['lost-fix-people'],
  queryFn: () => api(people, 'GET', '/api/lost-fixes/people'),
});

/** What has changed replaces what is there; a new one comes first, one that does not belong on the list leaves it. */
export function mergeLostFixes(
  list: readonly LostFix[],
  changed: readonly LostFix[],
  belongs: (one: LostFix) => boolean,
): LostFix[] {
  const byId = new Map(changed.map((one) => [one.id, one]));
  const known = list.map((one) => byId.get(one.id) ?? one);
  // The same one may have changed twice in a batch: the last counts.
  const added = [...byId.values()].filter(({ id }) => !list.some((one) => one.id === id));
  return [...added.toReversed(), ...known].filter(belongs);
}

const belongsTo =
  (filter: LostFixFilter) =>
  (one: LostFix): boolean =>
    (one.status === 'closed') === (filter.status === 'closed') &&
    (!filter.roverId || String(one.roverId) === filter.roverId) &&
    (!filter.crewId || String(one.crewId) === filter.crewId) &&
    (!filter.mountPoint || one.mountPoint === filter.mountPoint);

/** Puts what the stream brought into every list that is on the page; details are read anew, with their history. */
export function landLostFixes(client: QueryClient, changed: readonly LostFix[]): void {
  for (const [key, list] of client.getQueriesData<LostFixList>({ queryKey: listKey })) {
    const filter = key[1] as LostFixFilter;
    if (!list) continue;
    const lostFixes = mergeLostFixes(list.lostFixes, changed, belongsTo(filter));
    client.setQueryData(key, { ...list, lostFixes });
  }
  for (const { id, sharedId } of changed) {
    void client.invalidateQueries({ queryKey: oneKey(id) });
    if (sharedId !== null) void client.invalidateQueries({ queryKey: oneKey(sharedId) });
  }
}

/** Something a person does about a lost fix; lists show it without waiting for the stream. */
function useAction<Body>(send: (body: Body) => Promise<LostFix>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: send,
    onSuccess: (changed) => landLostFixes(client, [changed]),
    // Refused because it stands otherwise: show how.
    onError: () => client.invalidateQueries({ queryKey: listKey }),
  });
}

const path = (id: number, what: string) => `/api/lost-fixes/${id}/${what}`;
export const useTake = (id: number) => useAction<void>(() => api(lostFix, 'POST', path(id, 'take')));
export const useHandOver = (id: number) =>
  useAction((body: { userId: number }) => api(lostFix, 'POST', path(id, 'hand-over'), body));
export const useAdvise = (id: number) =>
  useAction((body: { text: string }) => api(lostFix, 'POST', path(id, 'advice'), body));
export const useClose = (id: number) =>
  useAction((body: CloseBody) => api(lostFix, 'POST', path(id, 'close'), body));
export const useShelve = (id: number) =>
  useAction((body: ShelveBody) => api(lostFix, 'POST', path(id, 'shelve'), body));
export const useUnshelve = (id: number) => useAction<void>(() => api(lostFix, 'DELETE', path(id, 'shelve')));
