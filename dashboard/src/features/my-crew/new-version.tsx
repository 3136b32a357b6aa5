import { Button } from '@fluentui/react-components';
import { useSyncExternalStore } from 'react';
import { worker } from '../../offline/worker';

/** A new version takes over at the next start, or now, when the person says so: never under a thumb. */
export function NewVersion() {
  const isThere = useSyncExternalStore(worker.subscribe, worker.hasNewVersion);
  if (!isThere) return null;
  return (
    <div className="new-version" role="status">
      <span>A new version is there</span>
      <Button onClick={worker.takeNewVersion}>Use it now</Button>
    </div>
  );
}
