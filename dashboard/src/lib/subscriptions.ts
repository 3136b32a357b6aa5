import { subscriptionList, type SheetKind } from '@hubtack/contracts/sheets/subscription.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from './api';
import { useChange } from './use-change';

/** Which sheets I have sent by mail. */
export const subscriptionsQuery = queryOptions({
  queryKey: ['subscriptions'],
  queryFn: () => api(subscriptionList, 'GET', '/api/subscriptions'),
});

export const useChangeSubscriptions = () =>
  useChange(
    (sheets: readonly SheetKind[]) => api(subscriptionList, 'PUT', '/api/subscriptions', { sheets }),
    [subscriptionsQuery.queryKey],
  );
