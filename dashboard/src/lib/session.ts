import { me, signInHints, type Me, type SignInBody } from '@hubtack/contracts/auth/sign-in.js';
import { type QueryClient, queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { createContext, useContext } from 'react';
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

const MeContext = createContext<Me | null>(null);
/**
 * Around the pages behind the sign-in. They take who is signed in from here and not from the query: when a sign-in
 * ends, what is still on the screen for a moment must not find nobody.
 */
export const SignedIn = MeContext.Provider;

/** The person or display on whose behalf the page runs; pages behind the sign-in always have one. */
export function useMe(): Me {
  const signedIn = useContext(MeContext);
  if (!signedIn) throw new Error('This page needs a sign-in');
  return signedIn;
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
    onSettled: async () => {
      // An answer that is still on its way would sign the page in again.
      await client.cancelQueries({ queryKey: meQuery.queryKey });
      client.setQueryData(meQuery.queryKey, null);
      forgetOthers(client);
    },
  });
}
