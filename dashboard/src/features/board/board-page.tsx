import { Button, SearchBox } from '@fluentui/react-components';
import { lazy, Suspense, useCallback, useMemo, useRef, useState } from 'react';
import { ErrorBoundary } from '../../components/error-boundary';
import { Empty, Failed, Loading } from '../../components/query-states';
import { useLanes, useOpenLostFixes, useServerNow } from '../../live/use-lanes';
import { useMe } from '../../lib/session';
import { Announcer } from './announcer';
import { BoardKeys } from './board-keys';
import { fitsFilter, noFilter, type BoardFilter } from './filter';
import { LaneList } from './lane-list';
import { StateCounts } from './state-counts';
import { useCalmOrder } from './use-calm-order';
import './board.css';

const TodayChart = lazy(() => import('./today-chart'));
const LanePanel = lazy(() => import('./lane-panel'));
const SitePlan = lazy(() => import('./site-plan'));

export default function BoardPage() {
  const { data: board, error, refetch } = useLanes();
  const me = useMe();
  const now = useServerNow();
  const lostFixes = useOpenLostFixes();
  const [filter, setFilter] = useState<BoardFilter>(noFilter);
  const [openId, setOpenId] = useState<number | null>(null);
  const [view, setView] = useState<'list' | 'plan'>('list');
  const [showsToday, setShowsToday] = useState(false);
  const search = useRef<HTMLInputElement>(null);
  const area = useRef<HTMLDivElement>(null);
  const isHeld = useCallback(() => {
    const lanes = area.current?.querySelector('.lanes-body');
    return lanes?.matches(':hover, :focus-within') ?? false;
  }, []);
  const lanes = useMemo(() => [...(board?.values() ?? [])], [board]);
  const shown = useMemo(() => lanes.filter((lane) => fitsFilter(lane, filter, now)), [lanes, filter, now]);
  const order = useCalmOrder(shown, lostFixes, now, isHeld);
  const open = useCallback((id: number) => setOpenId((before) => (before === id ? null : id)), []);

  if (!board && error) return <Failed error={error} retry={() => void refetch()} />;
  if (!board) return <Loading what="the board" />;
  if (lanes.length === 0)
    return (
      <Empty title="No rover is on the board yet">
        {me.role === 'crewChief'
          ? 'Your crew has no rover today. The office assigns one.'
          : 'Add a rover, issue its key, and give it to a crew. Its lane appears here.'}
      </Empty>
    );
  return (
    <div className="board" ref={area}>
      <h1 className="visually-hidden">Board</h1>
      <Announcer lanes={lanes} now={now} />
      <StateCounts
        lanes={lanes}
        now={now}
        chosen={filter.state}
        onChoose={(state) => setFilter((before) => ({ ...before, state }))}
      />
      <div className="board-tools">
        <SearchBox
          ref={search}
          value={filter.text}
          onChange={(_, { value }) => setFilter((before) => ({ ...before, text: value }))}
          placeholder="Crew, rover, site or base"
          aria-label="Search the board"
        />
        <Button
          appearance={filter.onlyOnShift ? 'primary' : 'secondary'}
          aria-pressed={filter.onlyOnShift}
          onClick={() => setFilter((before) => ({ ...before, onlyOnShift: !before.onlyOnShift }))}
        >
          On shift only
        </Button>
        <span className="board-tools-gap" />
        <Button aria-expanded={showsToday} onClick={() => setShowsToday((before) => !before)}>
          Today by crew
        </Button>
        <Button onClick={() => setView((before) => (before === 'list' ? 'plan' : 'list'))}>
          {view === 'list' ? 'Show the plan' : 'Show the list'}
        </Button>
        <BoardKeys search={search} onEscape={() => setOpenId(null)} />
      </div>
      {showsToday && (
        <ErrorBoundary>
          <Suspense fallback={<Loading what="today" />}>
            <TodayChart />
          </Suspense>
        </ErrorBoundary>
      )}
      <ErrorBoundary>
        {view === 'plan' ? (
          <Suspense fallback={<Loading what="the plan" />}>
            <SitePlan lanes={shown} onOpen={open} />
          </Suspense>
        ) : shown.length === 0 ? (
          <Empty title="No lane fits">
            <Button onClick={() => setFilter(noFilter)}>Show all lanes</Button>
          </Empty>
        ) : (
          <LaneList order={order} openId={openId} onOpen={open} />
        )}
      </ErrorBoundary>
      <p className="caution">
        Fixed is the receiver’s own claim: check into known control before and during work. A quiet rover may
        be a flat battery or a person in trouble; lone-work and traffic rules of the place come first.
      </p>
      {openId !== null && board.has(openId) && (
        <ErrorBoundary resetKey={String(openId)}>
          <Suspense fallback={null}>
            <LanePanel id={openId} onClose={() => setOpenId(null)} />
          </Suspense>
        </ErrorBoundary>
      )}
    </div>
  );
}
