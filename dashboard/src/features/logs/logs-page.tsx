import { Button, ProgressBar } from '@fluentui/react-components';
import type { Log } from '@hubtack/contracts/logs/log.js';
import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { DataTable } from '../../components/data-table';
import { ListPage } from '../../components/list-page';
import { Empty } from '../../components/query-states';
import { dayAndTime, utc } from '../../lib/format';
import { isUnderWay, logsQuery, useRemoveLog } from '../../lib/logs';
import { useMe } from '../../lib/session';
import { size, statusWords } from './log-words';
import { UploadForm } from './upload-form';
import './logs.css';

function Status({ log }: { log: Log }) {
  if (log.status === 'failed') return <>{log.problem ?? statusWords.failed}</>;
  if (log.status !== 'reading') return <>{statusWords[log.status]}</>;
  return (
    <div className="log-progress">
      {Math.round(log.progress * 100)} %
      <ProgressBar value={log.progress} aria-label={`${log.name} is being read`} />
    </div>
  );
}

/** Receivers' logs, read and explained. */
export default function LogsPage() {
  const query = useQuery(logsQuery);
  const { timeZone } = useMe();
  const remove = useRemoveLog();
  return (
    <ListPage title="Logs" what="the logs" query={query}>
      {(logs) => (
        <>
          <UploadForm />
          <p>
            A line or two are read in the <Link to="/sentence-reader">Sentence reader</Link>.
          </p>
          <h2>Read before</h2>
          {remove.error && <p role="status">{remove.error.message}</p>}
          {logs.length === 0 ? (
            <Empty title="No log yet">
              When one rover misbehaves, read the log of its receiver here: it says when the fix was lost, and
              why.
            </Empty>
          ) : (
            <DataTable
              label="Logs"
              rows={logs}
              rowKey={({ id }) => id}
              columns={[
                { name: 'File', cell: (log) => <Link to={`/logs/${log.id}`}>{log.name}</Link> },
                { name: 'Size', figure: true, cell: ({ bytes }) => size(bytes) },
                {
                  name: 'Uploaded',
                  cell: ({ at, by }) => (
                    <span title={utc(Date.parse(at))}>
                      {dayAndTime(Date.parse(at), timeZone)}, {by}
                    </span>
                  ),
                },
                { name: 'Rover', cell: ({ roverLabel }) => roverLabel ?? '' },
                { name: 'State', cell: (log) => <Status log={log} /> },
                {
                  name: 'Remove',
                  cell: (log) => (
                    <Button
                      size="small"
                      disabled={remove.isPending}
                      onClick={() => remove.mutate(log.id)}
                      aria-label={`${isUnderWay(log) ? 'Stop reading' : 'Remove'} ${log.name}`}
                    >
                      {isUnderWay(log) ? 'Stop' : 'Remove'}
                    </Button>
                  ),
                },
              ]}
            />
          )}
        </>
      )}
    </ListPage>
  );
}
