import { noticeList, noticeRules, type Notice, type NoticeRule } from '@hubtack/contracts/notices/notice.js';
import { queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { api, apiVoid } from './api';
import { useChange } from './use-change';

/** Mine, the newest first. The stream adds to them. */
export const noticesQuery = queryOptions({
  queryKey: ['notices'],
  queryFn: () => api(noticeList, 'GET', '/api/notices'),
});

export function landNotice(client: QueryClient, told: Notice): void {
  client.setQueryData(noticesQuery.queryKey, (known) =>
    known ? [told, ...known.filter(({ id }) => id !== told.id)] : known,
  );
}

export const noticeRulesQuery = queryOptions({
  queryKey: ['notice-rules'],
  queryFn: () => api(noticeRules, 'GET', '/api/notice-rules'),
});

export function useNoticesSeen() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (upTo: number) => apiVoid('POST', '/api/notices/seen', { upTo }),
    onSuccess: () => client.invalidateQueries({ queryKey: noticesQuery.queryKey }),
  });
}

const touches = [noticeRulesQuery.queryKey];
export const useChangeNoticeRules = () =>
  useChange((rules: NoticeRule[]) => api(noticeRules, 'PUT', '/api/notice-rules', rules), touches);
export const useDefaultNoticeRules = () =>
  useChange<void, unknown>(() => api(noticeRules, 'DELETE', '/api/notice-rules'), touches);
