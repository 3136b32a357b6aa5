import { Button } from '@fluentui/react-components';
import type { Rover, RoverKey } from '@hubtack/contracts/rovers/rover.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { CopyText } from '../../components/copy-text';
import { DataTable } from '../../components/data-table';
import { Empty, Failed, Loading } from '../../components/query-states';
import { Sheet } from '../../components/sheet';
import { dayAndTime } from '../../lib/format';
import { roverKeysQuery, useIssueKey, useRevokeKey } from '../../lib/rovers';
import { useMe } from '../../lib/session';
import { connectTexts } from './connect-text';

function ConnectHelp({ keyText }: { keyText: string }) {
  return (
    <>
      {connectTexts(location.origin, location.hostname, keyText).map(({ name, words, text }) => (
        <section key={name} className="connect-way">
          <h3>{name}</h3>
          <p>{words}</p>
          <CopyText text={text} label={name} />
        </section>
      ))}
    </>
  );
}

function RevokeKey({
  roverId,
  roverKey,
  onDone,
}: {
  roverId: number;
  roverKey: RoverKey;
  onDone: () => void;
}) {
  const revoke = useRevokeKey(roverId);
  return (
    <Sheet title={`Take back the key ${roverKey.hint}…?`} onClose={onDone}>
      <p>
        Whatever still uses it is refused from now on, and an open connection is closed. This cannot be
        undone.
      </p>
      {revoke.error && <p role="alert">{revoke.error.message}</p>}
      <Button
        appearance="primary"
        disabled={revoke.isPending}
        onClick={() => revoke.mutate(roverKey.id, { onSuccess: onDone })}
      >
        Take it back
      </Button>
    </Sheet>
  );
}

/** Keys of a rover: issued once, several during a change-over, taken back one by one. */
export function RoverKeys({ rover }: { rover: Rover }) {
  const { data: keys, error, refetch } = useQuery(roverKeysQuery(rover.id));
  const issue = useIssueKey(rover.id);
  const { timeZone } = useMe();
  const [revoking, setRevoking] = useState<RoverKey | null>(null);
  const day = (at: string | null) => (at === null ? '–' : dayAndTime(Date.parse(at), timeZone));
  if (!keys)
    return error ? <Failed error={error} retry={() => void refetch()} /> : <Loading what="the keys" />;
  return (
    <section className="page-section">
      <div className="page-head">
        <h2>Keys</h2>
        <Button
          appearance="primary"
          disabled={rover.retired || issue.isPending}
          onClick={() => issue.mutate()}
        >
          Issue a key
        </Button>
      </div>
      {issue.error && <p role="alert">{issue.error.message}</p>}
      {issue.data && (
        <div className="issued-key" role="status">
          <p>
            <strong>This is the only time that the key is shown.</strong> Copy it to the rover now; the old
            ones go on working until you take them back.
          </p>
          <CopyText text={issue.data.key} label="the new key" />
          <ConnectHelp keyText={issue.data.key} />
        </div>
      )}
      {keys.length === 0 ? (
        <Empty title="No key yet">Issue one and put it into the receiver, the logger or the sender.</Empty>
      ) : (
        <DataTable
          label="Keys"
          rows={keys}
          rowKey={({ id }) => id}
          isFaded={({ revokedAt }) => revokedAt !== null}
          columns={[
            { name: 'Key', cell: ({ hint }) => <code>{hint}…</code> },
            { name: 'Issued', cell: ({ createdAt }) => day(createdAt) },
            {
              name: 'Last used',
              cell: ({ lastUsedAt }) => (lastUsedAt === null ? 'not yet' : day(lastUsedAt)),
            },
            {
              name: 'Standing',
              cell: (key) =>
                key.revokedAt === null ? (
                  <Button size="small" onClick={() => setRevoking(key)} aria-label={`Take back ${key.hint}`}>
                    Take back
                  </Button>
                ) : (
                  `taken back ${day(key.revokedAt)}`
                ),
            },
          ]}
        />
      )}
      {!issue.data && (
        <details className="connect-help">
          <summary>How to connect</summary>
          <ConnectHelp keyText="<rover key>" />
        </details>
      )}
      {revoking && <RevokeKey roverId={rover.id} roverKey={revoking} onDone={() => setRevoking(null)} />}
    </section>
  );
}
