import { Button, MessageBar, MessageBarBody } from '@fluentui/react-components';
import type { CorrectionSource } from '@hubtack/contracts/corrections/correction-source.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams, useSearchParams } from 'react-router-dom';
import { Empty, Failed, Loading } from '../../components/query-states';
import '../../components/data-table.css';
import { correctionChecksQuery, correctionSourceQuery, useStartCheck } from '../../lib/corrections';
import { dayAndTime } from '../../lib/format';
import { useMe } from '../../lib/session';
import { CheckHistory } from './check-history';
import { CheckView } from './check-view';
import { PlaceField, usePlaceChoice } from './place-field';
import { placeOf } from './place-choice';
import { SourceFacts } from './source-facts';
import { ChangeSource } from './source-sheets';
import './corrections.css';

export default function SourcePage() {
  const id = Number(useParams().id);
  const { data: source, error, refetch } = useQuery(correctionSourceQuery(id));
  const { role } = useMe();
  const { search } = usePlaceChoice();
  const [isChanging, setIsChanging] = useState(false);
  const mayChange = role === 'technician' || role === 'manager';
  const mayCheck = mayChange || role === 'dispatcher';
  if (!source)
    return error ? <Failed error={error} retry={() => void refetch()} /> : <Loading what="the source" />;
  return (
    <>
      <p className="back">
        <Link to="/corrections">All correction sources</Link>
      </p>
      <div className="page-head">
        <h1>{source.name}</h1>
        <div className="page-actions">
          <Link to={`/corrections/${id}/mount-points${search}`} className="page-link">
            Mount points of this caster
          </Link>
          {mayChange && <Button onClick={() => setIsChanging(true)}>Change</Button>}
        </div>
      </div>
      {error && <p role="status">This may be old: {error.message}</p>}
      <Down source={source} />
      <SourceFacts source={source} />
      <Checks key={id} source={source} mayChange={mayChange} mayCheck={mayCheck} />
      {isChanging && <ChangeSource source={source} onDone={() => setIsChanging(false)} />}
    </>
  );
}

function Down({ source: { downSince } }: { source: CorrectionSource }) {
  const { timeZone } = useMe();
  if (downSince === null) return null;
  return (
    <div className="base-alarm" role="status">
      <p>
        <strong>Down since {dayAndTime(Date.parse(downSince), timeZone)}.</strong> Crews on it get no
        corrections: call the operator, or move them to another source.
      </p>
    </div>
  );
}

interface ChecksProps {
  source: CorrectionSource;
  mayChange: boolean;
  mayCheck: boolean;
}

function Checks({ source, mayChange, mayCheck }: ChecksProps) {
  const { data, error, refetch } = useQuery(correctionChecksQuery(source.id));
  const [search, setSearch] = useSearchParams();
  const place = usePlaceChoice();
  const start = useStartCheck(source.id);
  const checks = data?.checks ?? [];
  const running = checks.find(({ status }) => status === 'running');
  const asked = Number(search.get('check'));
  const shownId = asked > 0 ? asked : checks[0]?.id;
  const withCheck = (checkId: number | null) => {
    const next = new URLSearchParams(search);
    next.delete('check');
    if (checkId !== null) next.set('check', String(checkId));
    return next;
  };
  const check = () =>
    start.mutate(placeOf(place.choice), {
      // The newest is shown: also the one that somebody else has started.
      onSettled: () => setSearch(withCheck(null), { replace: true }),
    });
  return (
    <>
      <section className="page-section" aria-label="Check">
        <h2>Check</h2>
        {mayCheck && (
          <div className="check-start">
            <PlaceField label="For the work at" choice={place.choice} choose={place.choose} />
            <Button appearance="primary" disabled={running !== undefined || start.isPending} onClick={check}>
              Check
            </Button>
            <p className="source-note">
              It goes on by itself when you leave this page.{' '}
              {source.sendPosition && 'The position of that place is sent to the network.'}
            </p>
          </div>
        )}
        {start.error && (
          <MessageBar intent="error" layout="multiline">
            <MessageBarBody>{start.error.message}</MessageBarBody>
          </MessageBar>
        )}
        {error && !data && <Failed error={error} retry={() => void refetch()} />}
        {!data && !error && <Loading what="the checks" />}
        {data && shownId === undefined && (
          <Empty title="Never checked">
            A check walks from the address to the base position, and says where it stops and what to try. One
            mistyped character is the usual reason for no fix.
          </Empty>
        )}
        {shownId !== undefined && (
          <CheckView
            key={shownId}
            source={source}
            checkId={shownId}
            mayChange={mayChange}
            mayCheck={mayCheck}
            checkAgain={check}
          />
        )}
      </section>
      {checks.length > 0 && (
        <CheckHistory checks={checks} shownId={shownId} linkTo={(id) => `?${withCheck(id)}`} />
      )}
    </>
  );
}
