import { Button, MessageBar, MessageBarActions, MessageBarBody } from '@fluentui/react-components';
import type { CorrectionSource } from '@hubtack/contracts/corrections/correction-source.js';
import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import { useQuery } from '@tanstack/react-query';
import { lazy, Suspense, useDeferredValue, useMemo, useState } from 'react';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { Empty, Failed, Loading } from '../../components/query-states';
import '../../components/data-table.css';
import { correctionSourceQuery, mountPointsQuery, useStartCheck } from '../../lib/corrections';
import { clockTimeSeconds, utc } from '../../lib/format';
import { useMe } from '../../lib/session';
import { ChooseSheet } from './choose-sheet';
import { MountPointFilterBar } from './mount-point-filter-bar';
import { filterMountPoints, noFilter, sortMountPoints, type Sorting } from './mount-point-list';
import { MountPointTable } from './mount-point-table';
import { placeOf } from './place-choice';
import { PlaceField, usePlaceChoice } from './place-field';
import './corrections.css';
import './mount-points.css';

const MountPointPlan = lazy(() => import('./mount-point-plan'));

export default function MountPointsPage() {
  const id = Number(useParams().id);
  const { data: source, error, refetch } = useQuery(correctionSourceQuery(id));
  if (!source)
    return error ? <Failed error={error} retry={() => void refetch()} /> : <Loading what="the source" />;
  return <MountPoints key={id} source={source} />;
}

function MountPoints({ source }: { source: CorrectionSource }) {
  const place = usePlaceChoice();
  const { role, timeZone } = useMe();
  const query = useQuery(mountPointsQuery(source, placeOf(place.choice)));
  const [chosen, setChosen] = useState<MountPoint | null>(null);
  const [isChanged, setIsChanged] = useState(false);
  const mayChange = role === 'technician' || role === 'manager';
  const { data, error, refetch, isFetching } = query;
  return (
    <>
      <p className="back">
        <Link to={`/corrections/${source.id}${place.search}`}>{source.name}</Link>
      </p>
      <div className="page-head">
        <h1>Mount points at {source.address}</h1>
        <div className="page-actions">
          {data && (
            <span className="check-when" title={utc(Date.parse(data.readAt))}>
              read {clockTimeSeconds(Date.parse(data.readAt), timeZone)}
            </span>
          )}
          <Button
            disabled={isFetching}
            title="The caster is asked at most once a minute"
            onClick={() => void refetch()}
          >
            Read it again
          </Button>
        </div>
      </div>
      <PlaceField label="Distances from" choice={place.choice} choose={place.choose} />
      {isChanged && <Changed source={source} />}
      {error && data && <p role="status">This list may be old: {error.message}</p>}
      {error && !data && <Failed error={error} retry={() => void refetch()} />}
      {!data && !error && <Loading what="the source table" />}
      {data && data.oddities.length > 0 && (
        <ul className="check-warning oddities" aria-label="What is odd about this source table">
          {data.oddities.map((oddity) => (
            <li key={oddity}>{oddity}</li>
          ))}
        </ul>
      )}
      {data && data.mountPoints.length === 0 && (
        <Empty title="This caster names no mount point">
          Its source table is empty. Ask the operator whether the login decides what is shown.
        </Empty>
      )}
      {data && data.mountPoints.length > 0 && (
        <Choice
          source={source}
          mountPoints={data.mountPoints}
          placeChoice={place.choice}
          onChoose={mayChange ? setChosen : null}
        />
      )}
      {chosen && (
        <ChooseSheet
          source={source}
          chosen={chosen}
          onClose={() => setChosen(null)}
          onChosen={() => {
            setChosen(null);
            setIsChanged(true);
          }}
        />
      )}
    </>
  );
}

interface ChoiceProps {
  source: CorrectionSource;
  mountPoints: readonly MountPoint[];
  placeChoice: string;
  onChoose: ((chosen: MountPoint) => void) | null;
}

function Choice({ source, mountPoints, placeChoice, onChoose }: ChoiceProps) {
  const hasPlace = placeChoice !== '';
  const [filter, setFilter] = useState(noFilter);
  const [wanted, setSorting] = useState<Sorting | null>(null);
  const [view, setView] = useState<'table' | 'plan'>('table');
  const sorting = wanted ?? (hasPlace ? 'distance' : 'name');
  const asked = useDeferredValue(filter);
  const shown = useMemo(
    () => sortMountPoints(filterMountPoints(mountPoints, asked), sorting),
    [mountPoints, asked, sorting],
  );
  return (
    <>
      <MountPointFilterBar
        mountPoints={mountPoints}
        filter={filter}
        setFilter={setFilter}
        sorting={sorting}
        setSorting={setSorting}
        hasPlace={hasPlace}
      />
      <div className="mount-point-count">
        <p role="status">
          {shown.length} of {mountPoints.length}
        </p>
        <Button onClick={() => setView(view === 'table' ? 'plan' : 'table')}>
          {view === 'table' ? 'Show the plan' : 'Show the table'}
        </Button>
      </div>
      {shown.length === 0 ? (
        <Empty title="None is like that">
          <Button onClick={() => setFilter(noFilter)}>Show all</Button>
        </Empty>
      ) : view === 'plan' ? (
        <Suspense fallback={<Loading what="the plan" />}>
          <MountPointPlan
            mountPoints={shown}
            current={source.mountPoint}
            placeChoice={placeChoice}
            onChoose={onChoose}
          />
        </Suspense>
      ) : (
        <MountPointTable mountPoints={shown} current={source.mountPoint} onChoose={onChoose} />
      )}
    </>
  );
}

function Changed({ source }: { source: CorrectionSource }) {
  const place = usePlaceChoice();
  const start = useStartCheck(source.id);
  const navigate = useNavigate();
  const check = () =>
    start.mutate(placeOf(place.choice), {
      onSettled: () => void navigate(`/corrections/${source.id}${place.search}`),
    });
  return (
    <MessageBar intent="success" layout="multiline">
      <MessageBarBody>
        The mount point of this source is {source.mountPoint} now. Set the rovers on it to the same.
      </MessageBarBody>
      <MessageBarActions>
        <Button appearance="primary" disabled={start.isPending} onClick={check}>
          Check it
        </Button>
      </MessageBarActions>
    </MessageBar>
  );
}
