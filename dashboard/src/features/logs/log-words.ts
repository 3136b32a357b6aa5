import type { LogDetail, LogStatus, LogSummary } from '@hubtack/contracts/logs/log.js';
import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { causeLabels } from '@hubtack/contracts/lost-fixes/cause.js';
import { percent } from '../../lib/percent';
import { duration } from '../../lib/format';

const MEGA = 1024 * 1024;

/** 12.3 MB, 845 kB, 120 bytes. */
export function size(bytes: number): string {
  if (bytes >= MEGA) return `${(bytes / MEGA).toFixed(1)} MB`;
  return bytes >= 1024 ? `${Math.round(bytes / 1024)} kB` : `${bytes} bytes`;
}

export const statusWords: Record<LogStatus, string> = {
  waiting: 'Waits for the one before it',
  reading: 'Being read',
  done: 'Read',
  failed: 'Could not be read',
  cancelled: 'Cancelled',
};

const counts = ['No loss', 'One loss', 'Two losses', 'Three losses', 'Four losses', 'Five losses'];

/** The log in a sentence: how long it is, how much of it was fixed, and its longest loss with the likely cause. */
export function logSentence({ totals, epochs, lastTime }: LogSummary, { losses }: LogDetail): string {
  if (epochs === 0) return 'Nothing in this file says when or where a rover was.';
  const whole = wholeOf(totals);
  const fixed =
    whole === 0 ? 'a single epoch' : `${duration(whole)}, ${percent(totals.fixedMs, whole)} fixed`;
  const start = fixed.charAt(0).toUpperCase() + fixed.slice(1);
  if (losses.length === 0) return `${start}. No loss of the fix that counts.`;
  const lengths = losses.map(
    ({ start: from, end }) => Date.parse(end ?? lastTime ?? from) - Date.parse(from),
  );
  const longest = losses[lengths.indexOf(Math.max(...lengths))]!;
  const many = counts[losses.length] ?? `${losses.length} losses`;
  const about = losses.length === 1 ? 'of' : 'the longest';
  const cause = causeLabels[longest.cause];
  return `${start}. ${many}, ${about} ${duration(Math.max(...lengths))}: ${cause.charAt(0).toLowerCase()}${cause.slice(1)}.`;
}

export const dateWords: Record<NonNullable<LogDetail['dateFrom']>, string> = {
  given: 'The date is the one that was given.',
  sentences: 'The date stands in the log itself.',
  arrival: 'Nothing in the log says the date: the day of the upload was taken.',
};

/** What of the sentences could be used, and what became of the others; noughts are left out. */
export function countRows(summary: LogSummary): [string, number][] {
  const rows: [string, number][] = [
    ['Sentences', summary.sentences],
    ['Positions (GGA)', summary.ggaSentences],
    ['Epochs', summary.epochs],
    ['Same instant again', summary.duplicates],
    ['Wrong checksum', summary.badChecksum],
    ['Malformed', summary.malformed],
    ['Without a time', summary.untimed],
    ['Not needed', summary.ignored],
  ];
  return rows.filter(([name, count]) => count > 0 || name === 'Sentences' || name === 'Epochs');
}
