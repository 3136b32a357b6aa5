import { QueryClient } from '@tanstack/react-query';
import { ApiError } from './api';

const TRIES = 3;

/** Refusals are final; a server that is away is tried again. */
const mayRetry = (failures: number, error: Error): boolean =>
  failures < TRIES && error instanceof ApiError && (error.code === 'offline' || error.code === 'storageBusy');

export const queryClient = new QueryClient({
  defaultOptions: { queries: { staleTime: 10_000, retry: mayRetry }, mutations: { retry: false } },
});
