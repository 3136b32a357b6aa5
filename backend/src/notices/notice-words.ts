import { causeLabels, firstThings, type Cause } from '@hubtack/contracts/lost-fixes/cause.js';
import {
  flagLabels,
  type Diagnosis,
  type FlagWord,
  type LostFixKind,
} from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { Mail } from '../mail/mails.js';
import type { Occasion } from './notice-tellings.js';

/** What of a lost fix goes into words. */
export interface NoticeFacts {
  kind: LostFixKind;
  roverLabel: string | null;
  crewName: string | null;
  mountPoint: string | null;
  startAt: number;
  pausedMs: number;
  flagAt: number | null;
  flagWord: FlagWord | null;
  flagNote: string | null;
  diagnosis: Diagnosis | null;
}

const kindWords: Record<Exclude<LostFixKind, 'mountPoint' | 'flag'>, string> = {
  lostFix: 'lost fix',
  noFirstFix: 'no first fix',
  notHeard: 'not heard since the shift began',
};
/** Silence may be a flat battery or a person in trouble: the board never guesses which. */
const quiet: readonly Cause[] = ['wentQuiet', 'notHeard'];
const CALL = 'Call the crew.';

/** Short and plain, fit to be read out: "Dogwood: lost fix, 2 min. Sky blocked? Satellites 22 to 7." */
export function noticeText(
  occasion: Occasion,
  facts: NoticeFacts,
  advice: string | null,
  now: number,
): string {
  if (occasion.kind === 'advice') return `Advice for ${whoOf(facts)}: ${advice ?? ''}`;
  if (occasion.kind === 'flag') return sentences(flagged(facts), isQuiet(facts) && CALL);
  const text = facts.kind === 'flag' ? flagged(facts) : raised(facts, now);
  return occasion.kind === 'back' ? `Back from the shelf: ${text}` : text;
}

function raised(facts: NoticeFacts, now: number): string {
  if (facts.kind === 'mountPoint')
    return sentences(`Corrections stopped at mount point ${facts.mountPoint}.`, evidenceOf(facts));
  if (facts.kind === 'flag') return flagged(facts);
  const length = lengthWords(now - facts.startAt - facts.pausedMs);
  return sentences(`${whoOf(facts)}: ${kindWords[facts.kind]}, ${length}.`, whyOf(facts));
}

function flagged({ flagWord, flagNote, ...facts }: NoticeFacts): string {
  const word = flagWord === null ? 'lost fix' : flagLabels[flagWord].toLowerCase();
  return sentences(`${whoOf(facts)}: flagged by the crew, ${word}.`, flagNote);
}

function whyOf(facts: Pick<NoticeFacts, 'kind' | 'diagnosis'>): string {
  if (facts.kind === 'notHeard') return CALL;
  if (isQuiet(facts)) return sentences(evidenceOf(facts), CALL);
  const { diagnosis } = facts;
  if (!diagnosis || diagnosis.cause === 'unclear') return 'Cause unclear.';
  return sentences(`${causeLabels[diagnosis.cause]}?`, evidenceOf(facts));
}

const isQuiet = ({ kind, diagnosis }: Pick<NoticeFacts, 'kind' | 'diagnosis'>): boolean =>
  kind === 'notHeard' || (diagnosis !== null && quiet.includes(diagnosis.cause));

function evidenceOf({ diagnosis }: Pick<NoticeFacts, 'diagnosis'>): string | null {
  const label = diagnosis ? causeLabels[diagnosis.cause].toLowerCase() : '';
  // What the cause says already is no evidence: "still float? Float."
  const line = diagnosis?.evidence.find((one) => !label.includes(one.toLowerCase()));
  if (line === undefined) return null;
  return `${line.charAt(0).toUpperCase()}${line.slice(1).replaceAll(' → ', ' to ')}.`;
}

function whoOf({
  kind,
  crewName,
  roverLabel,
  mountPoint,
}: Pick<NoticeFacts, 'kind' | 'crewName' | 'roverLabel' | 'mountPoint'>): string {
  if (kind === 'mountPoint') return `mount point ${mountPoint}`;
  if (crewName === null) return roverLabel ?? 'A rover';
  return roverLabel === null ? crewName : `${crewName} (${roverLabel})`;
}

export function lengthWords(ms: number): string {
  const seconds = Math.max(0, Math.floor(ms / 1000));
  if (seconds < 60) return `${seconds} s`;
  const minutes = Math.floor(seconds / 60);
  return minutes < 60 ? `${minutes} min` : `${Math.floor(minutes / 60)} h ${minutes % 60} min`;
}

const sentences = (...parts: (string | null | false)[]): string => parts.filter(Boolean).join(' ');

/** The same by mail, with what to try first. */
export function noticeMail(to: string, text: string, facts: NoticeFacts, boardUrl: string): Mail {
  const [subject] = text.split(/(?<=[^.])\. |\.$/);
  const tries = facts.diagnosis ? [`First thing to try: ${firstThings[facts.diagnosis.cause]}`, ''] : [];
  return {
    to,
    subject: subject!.slice(0, 150),
    text: [
      text,
      '',
      ...tries,
      boardUrl,
      '',
      'The board passes on what receivers say of themselves. It is no safety system, and a quiet rover says nothing about the people with it: call them.',
    ].join('\n'),
  };
}
