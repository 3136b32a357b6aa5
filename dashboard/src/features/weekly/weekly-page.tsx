import { Button, Input } from '@fluentui/react-components';
import type { Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { useQuery } from '@tanstack/react-query';
import { lazy, Suspense, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { ErrorBoundary } from '../../components/error-boundary';
import { Empty, Failed, Loading } from '../../components/query-states';
import { clockTime } from '../../lib/format';
import { weeklyCsvPath, weeklyQuery } from '../../lib/weekly';
import { CrewTable } from './crew-table';
import { FiguresList } from './figures-list';
import { isoWeekOf, weekAfter, weekDates } from './iso-week';
import { LostBars } from './lost-bars';
import { ShiftTable } from './shift-table';
import './weekly.css';

const WeeksLine = lazy(() => import('./weeks-line'));
const WEEK = /^\d{4}-W\d{2}$/;

/** How much paid time had a fix, what it cost, what to change. */
export default function WeeklyPage() {
  const [search, setSearch] = useSearchParams();
  const week = search.get('week');
  const compare = search.get('compare');
  const { data, error, refetch, isPlaceholderData } = useQuery(weeklyQuery(week, compare));
  const choose = (name: 'week' | 'compare', value: string | null) => {
    const next = new URLSearchParams(search);
    if (value) next.set(name, value);
    else next.delete(name);
    setSearch(next, { replace: true });
  };
  const [today] = useState(() => isoWeekOf(new Date()));
  const shown = week ?? data?.week ?? today;
  return (
    <div className="weekly">
      <header className="weekly-head">
        <div>
          <h1>Week {Number(shown.slice(6))}</h1>
          <p>
            {weekDates(shown)}
            {data && `, ${data.firmName}`}
            {data?.isPart && data.week === shown && ', this week is not over'}
          </p>
        </div>
        <div className="weekly-tools" role="group" aria-label="Which week">
          <Button onClick={() => choose('week', weekAfter(shown, -1))}>Week before</Button>
          <Input
            type="week"
            aria-label="Week"
            value={shown}
            onChange={(_, { value }) => WEEK.test(value) && choose('week', value)}
          />
          <Button onClick={() => choose('week', weekAfter(shown, 1))}>Week after</Button>
          {compare === null ? (
            <Button onClick={() => choose('compare', weekAfter(shown, -1))}>Compare</Button>
          ) : (
            <>
              <Input
                type="week"
                aria-label="Compared with"
                value={compare}
                onChange={(_, { value }) => WEEK.test(value) && choose('compare', value)}
              />
              <Button onClick={() => choose('compare', null)}>Do not compare</Button>
            </>
          )}
          <Button onClick={() => print()}>Print</Button>
          <a className="text-button" href={weeklyCsvPath(shown)} download>
            Spreadsheet (CSV)
          </a>
        </div>
      </header>
      {error && !isPlaceholderData && <Failed error={error} retry={() => void refetch()} />}
      {!data && !error && <Loading what="the week" />}
      {data && !(error && !isPlaceholderData) && (
        <div aria-busy={isPlaceholderData} className="weekly-body">
          <Week data={data} />
        </div>
      )}
    </div>
  );
}

function Week({ data }: { data: Weekly }) {
  if (wholeOf(data.total.totals) === 0)
    return (
      <Empty title="No shift was worked this week">
        Shifts come from what chiefs and dispatchers mark, else from each crew’s weekly pattern on the Crews
        page.
      </Empty>
    );
  const text = data.sentence.replace(/^Week \d+: /, '');
  return (
    <>
      <p className="weekly-sentence">{text.charAt(0).toUpperCase() + text.slice(1)}</p>
      <CrewTable data={data} />
      <div className="weekly-columns">
        <FiguresList data={data} />
        <ErrorBoundary>
          <Suspense fallback={<Loading what="the line of weeks" />}>
            <WeeksLine weeks={data.weeks} />
          </Suspense>
        </ErrorBoundary>
      </div>
      <LostBars data={data} />
      <ShiftTable data={data} />
      <p className="caution">
        As of {clockTime(data.asOf, data.timeZone)}. Paid time without a fix is not all lost work: crews walk,
        set out, draw and measure without one. Fixed is the receiver’s own claim. Percentiles: Hyndman-Fan
        type 7.
      </p>
    </>
  );
}
