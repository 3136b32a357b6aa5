import { Button, Input } from '@fluentui/react-components';
import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { pauseReasonLabels, type CrewDayView } from '@hubtack/contracts/shifts/shift.js';
import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import EpochCharts from '../../components/epoch-charts';
import { Empty, Failed, Loading } from '../../components/query-states';
import { SpanRibbon } from '../../components/span-ribbon';
import { useServerNow } from '../../live/use-lanes';
import { crewsQuery } from '../../lib/crews';
import { clockTime, duration, utc, zoneName } from '../../lib/format';
import { percent } from '../../lib/percent';
import { useMe } from '../../lib/session';
import { crewDayOnQuery, siteVisitsQuery } from '../../lib/shifts';
import { DayLostFixes } from './day-lost-fixes';
import { dayTotals, pausesOf, windowOf, workedOf } from './day-figures';
import './crew-day.css';

const HOUR_MS = 3_600_000;
const DATE = /^\d{4}-\d{2}-\d{2}$/;

const dayAfter = (date: string, days: number): string =>
  new Date(Date.parse(`${date}T00:00:00Z`) + days * 24 * HOUR_MS).toISOString().slice(0, 10);

/** One day of one crew: the whole shift as a ribbon, what was lost in it, and who marked what. */
export default function CrewDayPage() {
  const params = useParams();
  const crewId = Number(params.id);
  const date = params.date ?? '';
  const navigate = useNavigate();
  const { data, error, refetch } = useQuery(crewDayOnQuery(crewId, date));
  const go = (to: string) => void navigate(`/crews/${crewId}/days/${to}`, { replace: true });
  const words = new Date(`${date}T00:00:00Z`).toLocaleDateString('en-GB', {
    dateStyle: 'full',
    timeZone: 'UTC',
  });
  return (
    <div className="crew-day">
      <header className="weekly-head">
        <div>
          <h1>{data?.crewName ?? 'Crew'}</h1>
          <p>{words}</p>
        </div>
        <div className="weekly-tools" role="group" aria-label="Which day">
          <Button onClick={() => go(dayAfter(date, -1))}>Day before</Button>
          <Input
            type="date"
            aria-label="Day"
            value={date}
            onChange={(_, { value }) => DATE.test(value) && go(value)}
          />
          <Button onClick={() => go(dayAfter(date, 1))}>Day after</Button>
        </div>
      </header>
      {error && !data && <Failed error={error} retry={() => void refetch()} />}
      {!data && !error && <Loading what="the day" />}
      {data && <Day day={data} date={date} />}
    </div>
  );
}

function Day({ day, date }: { day: CrewDayView; date: string }) {
  const now = useServerNow();
  const { timeZone } = useMe();
  const site = useQuery(crewsQuery).data?.find(({ id }) => id === day.crewId)?.siteName;
  if (day.rovers.length === 0)
    return (
      <Empty title="The crew had no rover on this day">Rovers are handed to crews on the Rovers page.</Empty>
    );
  return (
    <>
      <p>
        Times of {zoneName(day.dayStart, timeZone)}.{site && ` The crew’s site is ${site}.`}
        {day.basis === 'noShiftSet' && ' No shift was set: whatever was heard counts.'}
        {day.basis === 'pattern' && ' Counted by the weekly pattern: nobody marked anything.'}
      </p>
      {day.rovers.map((rover) => (
        <RoverDay key={rover.id} day={day} rover={rover} now={now} zone={timeZone} />
      ))}
      <SitesVisited crewId={day.crewId} date={date} zone={timeZone} />
      <Marks day={day} zone={timeZone} />
      <DayLostFixes lostFixes={day.lostFixes} zone={timeZone} now={now} />
    </>
  );
}

interface RoverDayProps {
  day: CrewDayView;
  rover: CrewDayView['rovers'][number];
  now: number;
  zone: string;
}

function RoverDay({ day, rover, now, zone }: RoverDayProps) {
  const worked = workedOf(day, rover.spans, now);
  const totals = dayTotals(worked, rover.spans);
  const window = windowOf(worked, day);
  const whole = wholeOf(totals);
  return (
    <section className="rover-day" aria-label={rover.label}>
      <h2>{rover.label}</h2>
      <p>
        {percent(totals.fixedMs, whole)} fix uptime over {duration(whole)} on shift;{' '}
        {duration(totals.floatMs)} float, {duration(totals.codeMs)} code only, {duration(totals.noneMs)} no
        position, {duration(totals.silentMs)} quiet.
      </p>
      <SpanRibbon
        spans={rover.spans}
        pauses={pausesOf(worked)}
        from={window.start}
        to={window.end}
        zone={zone}
        label={`${rover.label} over the shift`}
        tickMs={HOUR_MS}
      />
      <p className="day-ends">
        <span>{clockTime(window.start, zone)}</span>
        <span>{clockTime(window.end, zone)}</span>
      </p>
      {worked.length > 0 && (
        <EpochCharts
          roverId={rover.id}
          from={window.start}
          to={Math.min(window.end, day.dayEnd)}
          zone={zone}
        />
      )}
    </section>
  );
}

function SitesVisited({ crewId, date, zone }: { crewId: number; date: string; zone: string }) {
  const { data, error, refetch } = useQuery(siteVisitsQuery(crewId, date));
  return (
    <section aria-label="Sites visited">
      <h2>Sites visited</h2>
      {error && !data && <Failed error={error} retry={() => void refetch()} />}
      {data?.length === 0 && (
        <p>
          No rover of the crew was within a kilometre of a site for five minutes, or the positions of that day
          are no longer kept.
        </p>
      )}
      <ul className="day-marks">
        {data?.map(({ roverLabel, siteName, start, end }) => (
          <li key={`${roverLabel} ${start}`}>
            <time title={utc(start)}>{clockTime(start, zone)}</time> to{' '}
            <time title={utc(end)}>{clockTime(end, zone)}</time> {siteName} <small>{roverLabel}</small>
          </li>
        ))}
      </ul>
    </section>
  );
}

function Marks({ day, zone }: { day: CrewDayView; zone: string }) {
  if (day.shifts.length === 0) return null;
  const line = (at: number | null, what: string, by: string | null) =>
    at !== null && (
      <li key={`${at} ${what}`}>
        <time title={utc(at)}>{clockTime(at, zone)}</time> {what} {by && <small>{by}</small>}
      </li>
    );
  return (
    <section aria-label="Marks">
      <h2>Who marked what</h2>
      <ul className="day-marks">
        {day.shifts.flatMap(({ start, end, startedBy, endedBy, pauses }) => [
          line(start, 'Shift started', startedBy),
          ...pauses.flatMap((pause) => [
            line(pause.start, `Pause: ${pauseReasonLabels[pause.reason].toLowerCase()}`, pause.by),
            line(pause.end, 'Resumed', null),
          ]),
          line(end, 'Shift finished', endedBy),
        ])}
      </ul>
      <p>
        <Link to="/crews">Marks are set right on the Crews page.</Link>
      </p>
    </section>
  );
}
