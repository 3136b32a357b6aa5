import { Button, Spinner } from '@fluentui/react-components';
import type { ReactNode } from 'react';
import './query-states.css';

/** While a list is on its way. */
export const Loading = ({ what }: { what: string }) => (
  <div className="query-state">
    <Spinner size="small" label={`Reading ${what}`} />
  </div>
);

/** When it could not be read: what went wrong, and another try. */
export const Failed = ({ error, retry }: { error: Error; retry: () => void }) => (
  <div className="query-state" role="alert">
    <p>{error.message}</p>
    <Button onClick={retry}>Try again</Button>
  </div>
);

/** When there is nothing yet: what to do first. */
export const Empty = ({ title, children }: { title: string; children: ReactNode }) => (
  <div className="query-state">
    <h2>{title}</h2>
    <div>{children}</div>
  </div>
);
