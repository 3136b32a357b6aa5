import { percent } from '@hubtack/contracts/fixes/percent.js';
import { addTotals, noTotals, wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import { causeLabels, firstThings } from '@hubtack/contracts/lost-fixes/cause.js';
import {
  endingWords,
  flagLabels,
  lostFixKindWords,
  type LostFix,
} from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { DateTime } from 'luxon';
import type { Interval } from '../common/interval.js';
import { sheetHtml } from './sheet-html.js';
import { sheetText } from './sheet-text.js';
import { count, hoursWords, lengthWords, NO_DATA, oneLine } from './sheet-words.js';
import { stateBar } from './state-bar.js';
import type { Sheet, SheetMail, SheetPart } from './sheet.js';

/** One crew's day, when its shifts are over. */
export interface CrewDayFacts {
  firmName: string;
  crewName: string;
  /** Local day, YYYY-MM-DD. */
  day: string;
  timeZone: string;
  /** Whole shifts that began on this day, pauses included. */
  shifts: readonly Interval[];
  rovers: readonly { label: string; totals: StateTotals }[];
  /** That began in these shifts, in order. */
  lostFixes: readonly LostFix[];
  /** Of this crew, from before, and not closed. */
  waitingFromBefore: readonly LostFix[];
}

export function dailyMail(facts: CrewDayFacts, boardUrl: string): SheetMail {
  const sheet = dailySheet(facts, boardUrl);
  return { subject: sheet.subject, text: sheetText(sheet), html: sheetHtml(sheet) };
}

function dailySheet(facts: CrewDayFacts, boardUrl: string): Sheet {
  const { timeZone, rovers } = facts;
  const totals = rovers.map((rover) => rover.totals).reduce(addTotals, noTotals());
  const worked = wholeOf(totals);
  const crew = oneLine(facts.crewName);
  const day = DateTime.fromISO(facts.day, { zone: timeZone }).toFormat('cccc d LLLL yyyy');
  const uptime = percent(totals.fixedMs, worked);
  const shifts = facts.shifts.map(({ start, end }) => `${clock(start, timeZone)} to ${clock(end, timeZone)}`);
  return {
    subject: `${crew}, ${day}: ${uptime === NO_DATA ? 'no rover was on shift' : `${uptime} fix uptime`}`,
    line: `${crew}, ${day}, ${timeZone}. ${oneLine(facts.firmName)}`,
    parts: [
      { kind: 'lead', text: leadOf(facts, totals) },
      {
        kind: 'figures',
        lines: [
          { label: 'Shift', value: shifts.join(', ') },
          { label: 'On shift, pauses taken off', value: worked === 0 ? NO_DATA : hoursWords(worked) },
          { label: 'Fix uptime', value: uptime },
          { label: 'Without a fix', value: worked === 0 ? NO_DATA : hoursWords(worked - totals.fixedMs) },
        ],
      },
      ...roverParts(rovers),
      ...lostFixParts(facts),
      ...waitingParts(facts),
      {
        kind: 'caution',
        text: 'Fixed is the receiver’s own claim, and a fixed solution can be wrong: check into known control. Not all time without a fix was lost work.',
      },
      { kind: 'link', text: 'My crew', url: `${boardUrl}/my-crew` },
      {
        kind: 'paragraph',
        text: `Sent because you asked for it; ${boardUrl}/notices switches it off. Sentences that come late still change these figures.`,
      },
    ],
  };
}

const clock = (at: number, zone: string): string => DateTime.fromMillis(at, { zone }).toFormat('HH:mm');

function leadOf({ crewName, lostFixes }: CrewDayFacts, totals: StateTotals): string {
  const worked = wholeOf(totals);
  if (worked === 0) return `${oneLine(crewName)}: no rover was on shift.`;
  const lost =
    lostFixes.length === 0 ? 'nothing was lost' : count(lostFixes.length, 'lost fix', 'lost fixes');
  return `${oneLine(crewName)}: ${percent(totals.fixedMs, worked)} fix uptime in ${hoursWords(worked)} on shift; ${lost}.`;
}

function roverParts(rovers: CrewDayFacts['rovers']): SheetPart[] {
  if (rovers.length === 0) return [];
  return [
    { kind: 'heading', text: 'Rovers: share of on-shift time' },
    { kind: 'bars', bars: rovers.map(({ label, totals }) => stateBar(label, totals, [])) },
  ];
}

function lostFixParts({ lostFixes, timeZone }: CrewDayFacts): SheetPart[] {
  if (lostFixes.length === 0) return [];
  return [
    { kind: 'heading', text: 'What was lost' },
    {
      kind: 'figures',
      lines: lostFixes.map((lostFix) => ({
        label: `${clock(lostFix.startAt, timeZone)} ${nameOf(lostFix)}`,
        value: [lengthOf(lostFix), whyOf(lostFix), adviceOf(lostFix)].filter(Boolean).join(' '),
      })),
    },
  ];
}

const nameOf = ({ kind, roverLabel }: LostFix): string =>
  oneLine(`${lostFixKindWords[kind]}${roverLabel === null ? '' : `, ${roverLabel}`}`);

function lengthOf({ startAt, endAt, pausedMs, ending }: LostFix): string {
  if (endAt === null) return 'Still open.';
  const length = lengthWords(Math.max(0, endAt - startAt - pausedMs));
  return `${length}${ending === null ? '' : `, ${endingWords[ending].toLowerCase()}`}.`;
}

function whyOf({ closed, diagnosis, flag }: LostFix): string {
  const said = flag && `The crew said: ${flagLabels[flag.word].toLowerCase()}.`;
  const cause = closed
    ? `${causeLabels[closed.cause]}, confirmed.`
    : diagnosis && `${causeLabels[diagnosis.cause]}? Nobody has confirmed it.`;
  return [cause, said].filter(Boolean).join(' ') || 'Cause unclear.';
}

/** What a person advised; else the first thing to try. */
function adviceOf({ advice, diagnosis, closed }: LostFix): string {
  if (advice) return `Advice by ${oneLine(advice.by)}: ${oneLine(advice.text)}`;
  return diagnosis && !closed ? `First thing to try: ${firstThings[diagnosis.cause]}` : '';
}

/** The office closes; the crew knows best why. */
function waitingParts({ lostFixes, waitingFromBefore, timeZone }: CrewDayFacts): SheetPart[] {
  const today = lostFixes.filter(({ status }) => status !== 'closed');
  const waiting = [...waitingFromBefore, ...today];
  if (waiting.length === 0) return [];
  return [
    { kind: 'heading', text: 'Waiting to be closed by the office' },
    {
      kind: 'paragraph',
      text: 'If you know the cause of one of these, say so: it goes into the week by its confirmed cause.',
    },
    {
      kind: 'figures',
      lines: waiting.map((lostFix) => ({
        label: DateTime.fromMillis(lostFix.startAt, { zone: timeZone }).toFormat('d LLL HH:mm'),
        value: nameOf(lostFix),
      })),
    },
  ];
}
