import { me, signInHints, type Me, type SignInBody } from '@hubtack/contracts/auth/sign-in.js';
import {
  type QueryClient,
  queryOptions,
  useMutation,
  useQuery,
  useQueryClient,
  useSuspenseQuery,
} from '@tanstack/react-query';
import { ApiError, api, apiVoid } from './api';

const overCodes = ['unauthenticated', 'signInEnded', 'tokenReused'];

/** Who is signed in; null for nobody. */
export const meQuery = queryOptions({
  queryKey: ['me'],
  staleTime: 60_000,
  queryFn: async (): Promise<Me | null> => {
    try {
      return await api(me, 'GET', '/api/auth/me');
    } catch (error) {
      if (error instanceof ApiError && overCodes.includes(error.code)) return null;
      throw error;
    }
  },
});

/** The person or display on whose behalf the page runs; pages behind the sign-in always have one. */
export function useMe(): Me {
  const { data } = useSuspenseQuery(meQuery);
  if (!data) throw new Error('This page needs a sign-in');
  return data;
}

export const useSignInHints = () =>
  useQuery(
    queryOptions({
      queryKey: ['signInHints'],
      staleTime: Infinity,
      queryFn: () => api(signInHints, 'GET', '/api/auth/hints'),
    }),
  );

/** What one person has read is not the next one's. The sign-in itself stays: pages are looking at it. */
const forgetOthers = (client: QueryClient) =>
  client.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== meQuery.queryKey[0] });

/** Whatever signs in answers with who that is. */
export function useSigningIn<Body = SignInBody>(path: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: Body) => api(me, 'POST', path, body),
    onSuccess: (signedIn) => {
      client.setQueryData(meQuery.queryKey, signedIn);
      forgetOthers(client);
    },
  });
}

export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => apiVoid('POST', '/api/auth/sign-out'),
    onSettled: () => {
      client.setQueryData(meQuery.queryKey, null);
      forgetOthers(client);
    },
  });
}
