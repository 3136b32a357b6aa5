import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { Navigate, useLocation } from 'react-router-dom';
import { Failed, Loading } from '../components/query-states';
import { LiveProvider } from '../live/live-context';
import { meQuery, SignedIn } from '../lib/session';

/** Pages behind the sign-in. Who has none is asked for one, and comes back to where they were. */
export function RequireSignIn({ children }: { children: ReactNode }) {
  const { data: me, error, isPending, refetch } = useQuery(meQuery);
  const location = useLocation();
  if (isPending) return <Loading what="your sign-in" />;
  // A re-reading that fails in the background leaves the page as it is.
  if (error && me === undefined) return <Failed error={error} retry={() => void refetch()} />;
  if (!me) return <Navigate to="/sign-in" replace state={{ from: location.pathname }} />;
  if (me.role === 'display' && location.pathname !== '/wall') return <Navigate to="/wall" replace />;
  return (
    <SignedIn value={me}>
      <LiveProvider>{children}</LiveProvider>
    </SignedIn>
  );
}
