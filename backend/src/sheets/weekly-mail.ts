import { percent } from '@hubtack/contracts/fixes/percent.js';
import { fixStates, fixStateWords } from '@hubtack/contracts/fixes/fix-state.js';
import { addTotals, noTotals, totalOf, wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import { causeLabels } from '@hubtack/contracts/lost-fixes/cause.js';
import type { WeekCause, WeekCrew, WeekFigures, Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { stateBar } from './state-bar.js';
import { sheetHtml } from './sheet-html.js';
import { sheetText } from './sheet-text.js';
import {
  count,
  daysWords,
  exactTime,
  hoursWords,
  lengthWords,
  moneyWords,
  NO_DATA,
  oneLine,
} from './sheet-words.js';
import type { Bar, Sheet, SheetMail, SheetPart } from './sheet.js';

/** Mail programs cut long mails off: more crews than this are told together. */
const MOST_CREWS = 20;
const MOST_MOUNT_POINTS = 5;

export interface WeeklyMailOptions {
  /** Where browsers reach the board, without a slash at the end. */
  boardUrl: string;
  withMoney: boolean;
}

export function weeklyMail(weekly: Weekly, options: WeeklyMailOptions): SheetMail {
  const sheet = weeklySheet(weekly, options);
  return { subject: sheet.subject, text: sheetText(sheet), html: sheetHtml(sheet) };
}

function weeklySheet(weekly: Weekly, { boardUrl, withMoney }: WeeklyMailOptions): Sheet {
  const { week, total, from, to, timeZone, currency } = weekly;
  const days = daysWords(from, to, timeZone);
  const firm = oneLine(weekly.firmName);
  const name = `Week ${Number(week.slice(6))}`;
  const worked = wholeOf(total.totals);
  const uptime = worked === 0 ? 'no shift was worked' : `${uptimeOf(total.totals)} fix uptime`;
  const money = (figures: WeekFigures) => (withMoney ? `, ${moneyWords(figures.cost, currency)}` : '');
  const link: SheetPart = {
    kind: 'link',
    text: 'The whole week, by day, rover and lost fix',
    url: `${boardUrl}/weekly?week=${week}`,
  };
  const crews = crewsOf(weekly);
  return {
    subject: `${name}: ${uptime} - ${firm}`,
    line: `${name}, ${days}, ${timeZone}. ${firm}`,
    parts: [
      { kind: 'lead', text: oneLine(weekly.sentence) },
      ...(weekly.isPart ? [{ kind: 'paragraph', text: 'This week is not over yet.' } as const] : []),
      { kind: 'figures', lines: figureLines(weekly, withMoney) },
      {
        kind: 'caution',
        text: 'Paid time without a fix: not all of it was lost work. Crews also drive, set up and work without the rover. And fixed is the receiver’s own claim: it certifies no position.',
      },
      link,
      ...crewParts(crews, money),
      ...causeParts(weekly.causes),
      ...mountPointParts(weekly),
      ...timesParts(crews, total.totals),
      {
        kind: 'paragraph',
        text: `Sent because you asked for it; ${boardUrl}/notices switches it off. Sentences that come late still change these figures: the page has the newest.`,
      },
    ],
  };
}

const uptimeOf = (totals: StateTotals): string => percent(totals.fixedMs, wholeOf(totals));

function figureLines({ total, fourBefore, currency, profile }: Weekly, withMoney: boolean) {
  const { totals, regain, firstFix } = total;
  const worked = wholeOf(totals);
  const reported = worked - totals.silentMs;
  const lengths = ({ n, meanMs, p90Ms }: WeekFigures['regain'], of: string) =>
    n === 0 ? NO_DATA : `mean ${lengthWords(meanMs)}, 90th percentile (type 7) ${lengthWords(p90Ms)}, ${of}`;
  const limits = `age ${profile.maxAgeSeconds} s, HDOP ${profile.maxHdop}, ${profile.minSatellites} satellites`;
  return [
    {
      label: 'Fix uptime',
      value:
        worked === 0
          ? NO_DATA
          : `${uptimeOf(totals)} (${hoursWords(totals.fixedMs)} of ${hoursWords(worked)} on shift)`,
    },
    { label: 'Four weeks before', value: percent(fourBefore.fixedMs, fourBefore.onShiftMs) },
    { label: 'Reporting', value: percent(reported, worked) },
    { label: 'Fixed while reporting', value: percent(totals.fixedMs, reported) },
    {
      label: `Within tolerance, ${oneLine(profile.name)}`,
      value: `${percent(total.withinToleranceMs, worked)} (${limits})`,
    },
    { label: 'Lost fixes', value: worked === 0 ? NO_DATA : String(total.lostFixes) },
    { label: 'Time to regain', value: lengths(regain, count(regain.n, 'ended', 'ended')) },
    { label: 'Time to first fix', value: lengths(firstFix, count(firstFix.n, 'shift', 'shifts')) },
    {
      label: 'Paid time without a fix',
      value: worked === 0 ? NO_DATA : hoursWords(total.paidWithoutFixMs),
    },
    ...(withMoney
      ? [{ label: 'Its cost', value: worked === 0 ? NO_DATA : moneyWords(total.cost, currency) }]
      : []),
  ];
}

interface Crews {
  shown: readonly WeekCrew[];
  /** Those that there is no room for, together; null when all are shown. */
  others: { name: string; totals: StateTotals } | null;
}

/** The least fix uptime first: who is asked about. Crews without on-shift time come last. */
function crewsOf({ crews }: Weekly): Crews {
  const share = ({ figures: { totals } }: WeekCrew) =>
    wholeOf(totals) === 0 ? 2 : totals.fixedMs / wholeOf(totals);
  const sorted = crews.toSorted((a, b) => share(a) - share(b));
  if (sorted.length <= MOST_CREWS) return { shown: sorted, others: null };
  const rest = sorted.slice(MOST_CREWS);
  const totals = rest.map(({ figures }) => figures.totals).reduce(addTotals, noTotals());
  return {
    shown: sorted.slice(0, MOST_CREWS),
    others: { name: count(rest.length, 'other crew', 'other crews together'), totals },
  };
}

function crewParts({ shown, others }: Crews, money: (figures: WeekFigures) => string): SheetPart[] {
  if (shown.length === 0) return [];
  const bars = shown.map(({ crewName, figures }): Bar => {
    const { totals, lostFixes, regain, paidWithoutFixMs } = figures;
    const toRegain = regain.n === 0 ? '' : `, ${lengthWords(regain.meanMs)} to regain on average`;
    const lost = `${count(lostFixes, 'lost fix', 'lost fixes')}${toRegain}`;
    return stateBar(oneLine(crewName), totals, [
      `${lost}; ${hoursWords(paidWithoutFixMs)} without a fix${money(figures)}`,
    ]);
  });
  return [
    { kind: 'heading', text: 'Crews: share of on-shift time' },
    { kind: 'bars', bars: others ? [...bars, stateBar(others.name, others.totals, [])] : bars },
  ];
}

/** Nothing is rounded in it: rows and columns add up. */
function timesParts({ shown, others }: Crews, all: StateTotals): SheetPart[] {
  if (shown.length === 0) return [];
  const rows = [
    ...shown.map(({ crewName, figures }) => ({ name: oneLine(crewName), totals: figures.totals })),
    ...(others ? [others] : []),
    { name: 'All crews', totals: all },
  ];
  const withMs = rows.some(({ totals }) => fixStates.some((state) => totals[totalOf[state]] % 1000 !== 0));
  return [
    { kind: 'heading', text: 'Time in each state, h:mm:ss' },
    {
      kind: 'table',
      head: ['Crew', 'On shift', ...fixStates.map((state) => fixStateWords[state])],
      rows: rows.map(({ name, totals }) => [
        name,
        exactTime(wholeOf(totals), withMs),
        ...fixStates.map((state) => exactTime(totals[totalOf[state]], withMs)),
      ]),
    },
  ];
}

function causeParts(causes: readonly WeekCause[]): SheetPart[] {
  if (causes.length === 0) return [];
  const most = Math.max(...causes.map(({ lostMs }) => lostMs));
  const part = (text: string, isConfirmed: boolean): SheetPart[] => {
    const bars = causes
      .filter((cause) => cause.isConfirmed === isConfirmed)
      .map(({ cause, lostMs, lostFixes }): Bar => ({
        label: causeLabels[cause],
        value: hoursWords(lostMs),
        segments: [{ state: null, share: most === 0 ? 0 : lostMs / most }],
        words: [count(lostFixes, 'lost fix', 'lost fixes')],
      }));
    return bars.length === 0
      ? []
      : [
          { kind: 'heading', text },
          { kind: 'bars', bars },
        ];
  };
  return [
    ...part('Lost time by cause, confirmed by a person', true),
    ...part('Lost time by likely cause, confirmed by nobody', false),
  ];
}

function mountPointParts({ mountPoints }: Weekly): SheetPart[] {
  const worst = mountPoints.filter(({ lostMs }) => lostMs > 0).slice(0, MOST_MOUNT_POINTS);
  if (worst.length === 0) return [];
  return [
    { kind: 'heading', text: 'Most lost time by mount point' },
    {
      kind: 'figures',
      lines: worst.map(({ mountPoint, lostMs, lostFixes, fixedMs, onShiftMs }) => ({
        label: mountPoint === null ? 'No mount point set' : oneLine(mountPoint),
        value: `${hoursWords(lostMs)} in ${count(lostFixes, 'lost fix', 'lost fixes')}; fix uptime ${percent(fixedMs, onShiftMs)}`,
      })),
    },
  ];
}
