import type { UseQueryResult } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { Failed, Loading } from './query-states';
import './data-table.css';

interface ListPageProps<Data> {
  title: string;
  /** What is being read, in words. */
  what: string;
  query: UseQueryResult<Data>;
  action?: ReactNode;
  children: (data: Data) => ReactNode;
}

/** A page about a list: its heading, and the list's loading, error and stale states in one place. */
export function ListPage<Data>({ title, what, query, action, children }: ListPageProps<Data>) {
  const { data, error, refetch } = query;
  return (
    <>
      <div className="page-head">
        <h1>{title}</h1>
        {action}
      </div>
      {error && data !== undefined && <p role="status">This list may be old: {error.message}</p>}
      {data !== undefined ? (
        children(data)
      ) : error ? (
        <Failed error={error} retry={() => void refetch()} />
      ) : (
        <Loading what={what} />
      )}
    </>
  );
}
