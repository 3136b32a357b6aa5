import { Button, ProgressBar } from '@fluentui/react-components';
import type { LogWithDetail } from '@hubtack/contracts/logs/log.js';
import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { Empty, Failed, Loading } from '../../components/query-states';
import { dayAndTime, utc } from '../../lib/format';
import { isUnderWay, logQuery, useRemoveLog } from '../../lib/logs';
import { useMe } from '../../lib/session';
import { LogReading } from './log-reading';
import { size, statusWords } from './log-words';
import './logs.css';

/** One log: what it says, and why its fix was lost. */
export default function LogPage() {
  const id = Number(useParams().id);
  const { data, error, refetch } = useQuery(logQuery(id));
  if (data) return <Log log={data} />;
  if (error) return <Failed error={error} retry={() => void refetch()} />;
  return <Loading what="the log" />;
}

function Log({ log }: { log: LogWithDetail }) {
  const { timeZone } = useMe();
  const navigate = useNavigate();
  const remove = useRemoveLog();
  const at = Date.parse(log.at);
  return (
    <article className="log-page">
      <p>
        <Link to="/logs">All logs</Link>
      </p>
      <div className="page-head">
        <h1>{log.name}</h1>
        <Button
          disabled={remove.isPending}
          onClick={() => remove.mutate(log.id, { onSuccess: () => void navigate('/logs') })}
        >
          {isUnderWay(log) ? 'Stop reading' : 'Remove'}
        </Button>
      </div>
      {remove.error && <p role="status">{remove.error.message}</p>}
      <p className="log-facts">
        {size(log.bytes)}, uploaded <span title={utc(at)}>{dayAndTime(at, timeZone)}</span> by {log.by}
        {log.roverLabel && `, for ${log.roverLabel}`}
      </p>
      <State log={log} zone={timeZone} />
    </article>
  );
}

function State({ log, zone }: { log: LogWithDetail; zone: string }) {
  const { status, progress, problem, summary, detail } = log;
  if (summary && detail) return <LogReading log={log} summary={summary} detail={detail} zone={zone} />;
  switch (status) {
    case 'waiting':
    case 'reading':
      return (
        <div role="status" className="log-progress">
          <p>
            {statusWords[status]}
            {status === 'reading' && `: ${Math.round(progress * 100)} %`}. You can leave this page.
          </p>
          <ProgressBar value={progress} aria-label="Reading the log" />
        </div>
      );
    case 'failed':
      return <Empty title="This file could not be read">{problem ?? 'Nobody knows why.'}</Empty>;
    default:
      return <Empty title={statusWords[status]}>Nothing of it was kept. Upload it again to read it.</Empty>;
  }
}
