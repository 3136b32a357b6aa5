import { fixStateWords } from '@hubtack/contracts/fixes/fix-state.js';
import { causeLabels, firstThings } from '@hubtack/contracts/lost-fixes/cause.js';
import type { LogDetail, LogLoss, LogSummary, LogWithDetail } from '@hubtack/contracts/logs/log.js';
import { DataTable } from '../../components/data-table';
import { PointCharts } from '../../components/point-charts';
import { SpanRibbon } from '../../components/span-ribbon';
import { clockTimeSeconds, dayAndTime, duration, utc, zoneName } from '../../lib/format';
import { countRows, dateWords, logSentence } from './log-words';

interface Part {
  summary: LogSummary;
  detail: LogDetail;
  zone: string;
}

/** What was read from a log. */
export function LogReading({ log, summary, detail, zone }: Part & { log: LogWithDetail }) {
  const first = summary.firstTime === null ? null : Date.parse(summary.firstTime);
  return (
    <>
      <p className="log-sentence">{logSentence(summary, detail)}</p>
      {first !== null && (
        <p>
          From <span title={utc(first)}>{dayAndTime(first, zone)}</span>, times of {zoneName(first, zone)}.{' '}
          {detail.dateFrom && dateWords[detail.dateFrom]}
        </p>
      )}
      {detail.notes.map((note) => (
        <p key={note}>{note}</p>
      ))}
      {detail.history && <History history={detail.history} rover={log.roverLabel} />}
      <Figures summary={summary} />
      <Course summary={summary} detail={detail} zone={zone} />
      <Losses losses={detail.losses} zone={zone} />
      <Transitions summary={summary} zone={zone} />
      <Rejected detail={detail} />
      <p className="log-caution">
        “Fixed” is the receiver’s own claim, and a fixed position can be wrong. Check into known control; the
        licensed surveyor in charge, and local rules, decide what is acceptable.
      </p>
    </>
  );
}

function History({ history, rover }: { history: NonNullable<LogDetail['history']>; rover: string | null }) {
  const { accepted, duplicates, refused, reasons } = history;
  return (
    <p>
      In the history of {rover}: {accepted} epochs added
      {duplicates > 0 && `, ${duplicates} were there already`}
      {refused > 0 && `, ${refused} refused`}. {reasons.join(' ')}
    </p>
  );
}

const states = ['fixed', 'float', 'code', 'none', 'silent'] as const;

function Figures({ summary }: { summary: LogSummary }) {
  const { totals, medianSatellites, maxAgeSeconds } = summary;
  const rows: [string, string][] = [
    ...states.map((state): [string, string] => [
      fixStateWords[state],
      `${(totals[`${state}Ms`] / 1000).toFixed(1)} s`,
    ]),
    ['Satellites, median', medianSatellites === null ? 'not said' : String(medianSatellites)],
    ['Oldest corrections', maxAgeSeconds === null ? 'not said' : `${maxAgeSeconds} s`],
    ...countRows(summary).map(([name, count]): [string, string] => [name, String(count)]),
  ];
  return (
    <section aria-label="Figures">
      <h2>Figures</h2>
      <dl className="log-figures">
        {rows.map(([name, value]) => (
          <div key={name}>
            <dt>{name}</dt>
            <dd>{value}</dd>
          </div>
        ))}
      </dl>
    </section>
  );
}

/** So many ticks are enough, however long the log is. */
const tickOf = (ms: number): number =>
  [60_000, 300_000, 900_000, 3_600_000, 6 * 3_600_000].find((tick) => ms / tick <= 30) ?? 24 * 3_600_000;

function Course({ summary, detail, zone }: Part) {
  if (summary.firstTime === null || summary.lastTime === null) return null;
  const [from, to] = [Date.parse(summary.firstTime), Date.parse(summary.lastTime)];
  if (to <= from) return null;
  return (
    <section aria-label="Course">
      <h2>Course</h2>
      <SpanRibbon
        spans={detail.spans}
        pauses={[]}
        from={from}
        to={to}
        zone={zone}
        label="State over the log"
        tickMs={tickOf(to - from)}
      />
      <p className="log-ends">
        <span>{clockTimeSeconds(from, zone)}</span>
        <span>{clockTimeSeconds(to, zone)}</span>
      </p>
      {detail.points.length > 1 && <PointCharts points={detail.points} zone={zone} withHdop />}
    </section>
  );
}

function Losses({ losses, zone }: { losses: readonly LogLoss[]; zone: string }) {
  if (losses.length === 0) return null;
  return (
    <section aria-label="Losses">
      <h2>Losses, and what they likely were</h2>
      <ul className="log-losses">
        {losses.map(({ start, end, cause, evidence }) => {
          const from = Date.parse(start);
          const length = end === null ? 'to the end' : duration(Date.parse(end) - from);
          return (
            <li key={start}>
              <h3>
                <span title={utc(from)}>{clockTimeSeconds(from, zone)}</span>, {length}: {causeLabels[cause]}
              </h3>
              <p>{evidence.join('; ')}</p>
              <p className="log-try">{firstThings[cause]}</p>
            </li>
          );
        })}
      </ul>
    </section>
  );
}

function Transitions({
  summary: { transitions, moreTransitions },
  zone,
}: {
  summary: LogSummary;
  zone: string;
}) {
  if (transitions.length === 0) return null;
  return (
    <details className="log-transitions">
      <summary>
        {transitions.length + moreTransitions === 1
          ? 'One change of state'
          : `${transitions.length + moreTransitions} changes of state`}
      </summary>
      <DataTable
        label="Changes of state"
        rows={transitions}
        rowKey={({ time }) => time}
        columns={[
          {
            name: 'Time',
            figure: true,
            cell: ({ time }) => (
              <span title={utc(Date.parse(time))}>{clockTimeSeconds(Date.parse(time), zone)}</span>
            ),
          },
          { name: 'From', cell: ({ from }) => fixStateWords[from] },
          { name: 'To', cell: ({ to }) => fixStateWords[to] },
        ]}
      />
      {moreTransitions > 0 && <p>{moreTransitions} more are not listed.</p>}
    </details>
  );
}

function Rejected({ detail: { rejected, moreRejected } }: { detail: LogDetail }) {
  if (rejected.length === 0) return null;
  return (
    <details className="log-transitions">
      <summary>
        {rejected.length + moreRejected === 1
          ? 'One line could not be read'
          : `${rejected.length + moreRejected} lines could not be read`}
      </summary>
      <DataTable
        label="Lines that could not be read"
        rows={rejected}
        rowKey={({ line, code }) => `${line} ${code}`}
        columns={[
          { name: 'Line', figure: true, cell: ({ line }) => line },
          { name: 'Why', cell: ({ detail }) => detail },
          { name: 'Text', cell: ({ text }) => <code>{text}</code> },
        ]}
      />
      {moreRejected > 0 && <p>{moreRejected} more are not listed.</p>}
    </details>
  );
}
