import { z } from 'zod';
import { id, instantMs, instantText, optionalText, shortText } from '../common.js';
import { cause, confirmedCause } from './cause.js';

/**
 * `lostFix`, `noFirstFix`, `notHeard`: raised by the timeline. `mountPoint`: one for all rovers on a mount point, theirs
 * hang under it. `flag`: only a person says so.
 */
export const lostFixKinds = ['lostFix', 'noFirstFix', 'notHeard', 'mountPoint', 'flag'] as const;
export const lostFixKind = z.enum(lostFixKinds);
export type LostFixKind = z.infer<typeof lostFixKind>;

export const lostFixKindWords: Record<LostFixKind, string> = {
  lostFix: 'Lost fix',
  noFirstFix: 'No first fix',
  notHeard: 'Not heard',
  mountPoint: 'Mount point down',
  flag: 'Flagged',
};

/** Open until somebody takes it; ended when the fix is back (or the shift over); closed by a person. */
export const lostFixStatuses = ['open', 'taken', 'ended', 'closed'] as const;
export const lostFixStatus = z.enum(lostFixStatuses);
export type LostFixStatus = z.infer<typeof lostFixStatus>;

/** `withdrawn`: sentences that came late show that there was none. */
export const endings = ['regained', 'shiftEnd', 'withdrawn', 'person'] as const;
export const ending = z.enum(endings);
export type Ending = z.infer<typeof ending>;

export const endingWords: Record<Ending, string> = {
  regained: 'Fix regained',
  shiftEnd: 'Ended with the shift',
  withdrawn: 'Withdrawn: sentences that came late show that there was none',
  person: 'Ended by a person',
};

/** The chief's own words for what they see. */
export const flagWords = [
  'noCorrections',
  'underCover',
  'noMobileSignal',
  'receiverOrPole',
  'fixLooksWrong',
  'somethingElse',
] as const;
export const flagWord = z.enum(flagWords);
export type FlagWord = z.infer<typeof flagWord>;

export const flagLabels: Record<FlagWord, string> = {
  noCorrections: 'No corrections',
  underCover: 'Under cover',
  noMobileSignal: 'No mobile signal',
  receiverOrPole: 'Receiver or pole trouble',
  fixLooksWrong: 'Fix looks wrong',
  somethingElse: 'Something else',
};

/** A likely cause with its evidence in words, and what to try first. */
export const diagnosis = z.object({
  cause,
  evidence: z.array(z.string()),
  runnerUp: cause.nullable(),
  at: instantMs,
});
export type Diagnosis = z.infer<typeof diagnosis>;

export const lostFix = z.object({
  id,
  kind: lostFixKind,
  status: lostFixStatus,
  roverId: id.nullable().describe('Null for a mount point'),
  roverLabel: z.string().nullable(),
  crewId: id.nullable(),
  crewName: z.string().nullable(),
  crewPhone: z.string().nullable(),
  siteName: z.string().nullable(),
  mountPoint: z.string().nullable(),
  startAt: instantMs,
  raisedAt: instantMs,
  endAt: instantMs.nullable(),
  ending: ending.nullable(),
  pausedMs: z.number().int().describe('Pauses between start and end, taken off its length'),
  sharedId: id.nullable().describe('The mount point’s lost fix that this one hangs under'),
  members: z.number().int().describe('Lost fixes that hang under this one'),
  flag: z.object({ at: instantMs, word: flagWord, note: z.string().nullable(), by: z.string() }).nullable(),
  taken: z.object({ at: instantMs, by: z.string(), userId: id }).nullable(),
  advice: z.object({ at: instantMs, by: z.string(), text: z.string() }).nullable().describe('The newest'),
  shelved: z.object({ until: instantMs, by: z.string(), reason: z.string() }).nullable(),
  diagnosis: diagnosis.nullable().describe('As it stands; kept as it stood at closing'),
  diagnosisAtRaising: diagnosis.nullable(),
  isChattering: z.boolean().describe('The third of its rover within ten minutes, or one soon after'),
  photos: z.number().int(),
  closed: z
    .object({ at: instantMs, by: z.string(), cause: confirmedCause, note: z.string().nullable() })
    .nullable(),
});
export type LostFix = z.infer<typeof lostFix>;

export const historyKinds = [
  'raised',
  'flagged',
  'taken',
  'handedOver',
  'advice',
  'photo',
  'shelved',
  'backFromShelf',
  'corrected',
  'ended',
  'opened',
  'withdrawn',
  'closed',
] as const;
export const historyEntry = z.object({
  id,
  at: instantMs,
  by: z.string().nullable().describe('Null: the program itself'),
  kind: z.enum(historyKinds),
  text: z.string(),
});
export type HistoryEntry = z.infer<typeof historyEntry>;

export const photo = z.object({
  id,
  at: instantMs,
  by: z.string(),
  width: z.number().int(),
  height: z.number().int(),
});
export type Photo = z.infer<typeof photo>;
export const photoList = z.array(photo);

export const nearMountPoint = z.object({
  mountPoint: z.string(),
  name: z.string(),
  distanceM: z.number().int(),
  isOwn: z.boolean(),
  isInRange: z.boolean().describe('Within the firm’s longest baseline'),
});
export type NearMountPoint = z.infer<typeof nearMountPoint>;

export const lostFixDetail = lostFix.extend({
  history: z.array(historyEntry),
  photoList,
  memberList: z.array(lostFix),
  nearest: z.array(nearMountPoint),
});
export type LostFixDetail = z.infer<typeof lostFixDetail>;

export const lostFixList = z.object({ lostFixes: z.array(lostFix), nextBefore: id.nullable() });
export type LostFixList = z.infer<typeof lostFixList>;

/** The desk's list; `active` is everything that is not closed. */
export const lostFixQuery = z.object({
  status: z.enum(['active', 'closed', 'all']).default('active'),
  roverId: z.coerce.number().int().positive().optional(),
  crewId: z.coerce.number().int().positive().optional(),
  mountPoint: z.string().max(100).optional(),
  before: z.coerce.number().int().positive().optional(),
});
export type LostFixQuery = z.infer<typeof lostFixQuery>;

export const flagBody = z.object({
  roverId: id,
  word: flagWord,
  note: optionalText(),
  at: instantText.optional().describe('The time of the tap, when it comes later'),
});
export type FlagBody = z.infer<typeof flagBody>;

export const adviceBody = z.object({ text: shortText('the advice', 1000) });
export const handOverBody = z.object({ userId: id });
export const closeBody = z.object({ cause: confirmedCause, note: optionalText(1000) });
export type CloseBody = z.infer<typeof closeBody>;
export const shelveBody = z.object({
  minutes: z.number().int().min(1, 'At least a minute').max(480, 'At most eight hours'),
  reason: shortText('a reason', 200),
});
export type ShelveBody = z.infer<typeof shelveBody>;

/** Most photos of one lost fix, and the most bytes of one. */
export const MAX_PHOTOS = 4;
export const MAX_PHOTO_BYTES = 10 * 1024 * 1024;

/** People of the office whom a lost fix can be handed to. */
export const people = z.array(z.object({ id, name: z.string() }));
