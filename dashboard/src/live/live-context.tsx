import { useQuery, useQueryClient } from '@tanstack/react-query';
import { createContext, useContext, useEffect, useMemo, useSyncExternalStore, type ReactNode } from 'react';
import { boardQuery } from './board-query';
import { BoardStream } from './board-stream';
import { freshnessOf, type Freshness } from './stream-status';
import { useNow } from './use-now';

const StreamContext = createContext<BoardStream | null>(null);

/** Keeps one stream open for as long as somebody is signed in, on whatever page. */
export function LiveProvider({ children }: { children: ReactNode }) {
  const client = useQueryClient();
  const stream = useMemo(() => new BoardStream(client), [client]);
  const { data: firstCursor } = useQuery({ ...boardQuery, select: () => 'there' });
  useEffect(() => {
    const board = client.getQueryData(boardQuery.queryKey);
    if (firstCursor === undefined || !board) return undefined;
    stream.open(board.cursor);
    return () => stream.close();
  }, [client, stream, firstCursor]);
  return <StreamContext value={stream}>{children}</StreamContext>;
}

/** How fresh the page is, looked at once a second. */
export function useFreshness(): Freshness {
  const stream = useContext(StreamContext);
  if (!stream) throw new Error('useFreshness needs a LiveProvider');
  const now = useNow();
  useSyncExternalStore(stream.subscribe, stream.getStatus);
  return freshnessOf(stream.status, now);
}
