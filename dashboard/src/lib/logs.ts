import { acceptedLog, logList, logWithDetail, type Log } from '@hubtack/contracts/logs/log.js';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api, apiVoid } from './api';
import { upload } from './upload';
import { useChange } from './use-change';

const LOOK_MS = 500;
export const isUnderWay = ({ status }: Pick<Log, 'status'>): boolean =>
  status === 'waiting' || status === 'reading';

export const logsQuery = queryOptions({
  queryKey: ['logs'],
  queryFn: () => api(logList, 'GET', '/api/logs').then(({ logs }) => logs),
  refetchInterval: ({ state }) => (state.data?.some(isUnderWay) ? LOOK_MS * 2 : false),
});

export const logQuery = (id: number) =>
  queryOptions({
    queryKey: [...logsQuery.queryKey, id],
    queryFn: () => api(logWithDetail, 'GET', `/api/logs/${id}`),
    refetchInterval: ({ state }) => (state.data && isUnderWay(state.data) ? LOOK_MS : false),
  });

export interface LogUpload {
  file: File;
  date: string | null;
  roverId: number | null;
  signal: AbortSignal;
  onProgress: (sent: number, whole: number) => void;
}

function send({ file, date, roverId, ...options }: LogUpload): Promise<{ id: number }> {
  const form = new FormData();
  // Fields first: the server knows what the file is for before it comes.
  if (date !== null) form.append('date', date);
  if (roverId !== null) form.append('roverId', String(roverId));
  form.append('file', file);
  return upload(acceptedLog, '/api/logs', form, options);
}

const touches = [logsQuery.queryKey];
export const useUploadLog = () => useChange(send, touches);
/** Stops one that is being read, and removes any other. The log itself is not asked for again: it may be gone. */
export function useRemoveLog() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: number) => apiVoid('DELETE', `/api/logs/${id}`),
    onSuccess: () => client.invalidateQueries({ queryKey: logsQuery.queryKey, exact: true }),
  });
}
