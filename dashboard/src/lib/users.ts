import { auditList } from '@hubtack/contracts/audit/audit-entry.js';
import {
  displayLinkList,
  issuedDisplayLink,
  type DisplayLinkBody,
} from '@hubtack/contracts/displays/display-link.js';
import {
  invitedUser,
  user,
  userList,
  type ChangeUserBody,
  type InviteUserBody,
} from '@hubtack/contracts/users/user.js';
import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import { api, apiVoid } from './api';
import { useChange } from './use-change';

export const usersQuery = queryOptions({
  queryKey: ['users'],
  queryFn: () => api(userList, 'GET', '/api/users'),
});
export const displaysQuery = queryOptions({
  queryKey: ['displays'],
  queryFn: () => api(displayLinkList, 'GET', '/api/displays'),
});
export const auditQuery = infiniteQueryOptions({
  queryKey: ['audit'],
  initialPageParam: null as number | null,
  queryFn: ({ pageParam }) =>
    api(auditList, 'GET', `/api/audit${pageParam === null ? '' : `?before=${pageParam}`}`),
  getNextPageParam: ({ nextBefore }) => nextBefore,
});

const touches = [usersQuery.queryKey, auditQuery.queryKey];
export const useInviteUser = () =>
  useChange((body: InviteUserBody) => api(invitedUser, 'POST', '/api/users', body), touches);
export const useInviteAgain = () =>
  useChange((id: number) => api(invitedUser, 'POST', `/api/users/${id}/invite`, {}), touches);
export const useChangeUser = (id: number) =>
  useChange((body: ChangeUserBody) => api(user, 'PUT', `/api/users/${id}`, body), touches);

const displays = [displaysQuery.queryKey, auditQuery.queryKey];
export const useMakeDisplay = () =>
  useChange((body: DisplayLinkBody) => api(issuedDisplayLink, 'POST', '/api/displays', body), displays);
export const useRevokeDisplay = () =>
  useChange((id: number) => apiVoid('DELETE', `/api/displays/${id}`), displays);
