import type { Diagnosis, LostFix, LostFixStatus } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { lostFixes } from '@hubtack/drizzle/schema/lost-fixes.js';

export type LostFixRow = typeof lostFixes.$inferSelect;

/** A row with the names and counts that belong to it. */
export interface LostFixRecord {
  row: LostFixRow;
  roverLabel: string | null;
  crewName: string | null;
  crewPhone: string | null;
  siteName: string | null;
  takenBy: string | null;
  members: number;
  photos: number;
  /** The newest advice, its own or of the one it hangs under. */
  advice: { at: number; by: string | null; text: string } | null;
}

type StatusColumns = Pick<LostFixRow, 'closedAt' | 'endAt' | 'ending' | 'flagAt' | 'takenAt'>;

/** What nobody has to look at is closed: also one that was withdrawn before anybody said or did anything about it. */
export function statusOf({ closedAt, endAt, ending, flagAt, takenAt }: StatusColumns): LostFixStatus {
  if (closedAt !== null) return 'closed';
  if (ending === 'withdrawn' && flagAt === null && takenAt === null) return 'closed';
  if (endAt !== null) return 'ended';
  return takenAt === null ? 'open' : 'taken';
}

/** A chief's word that the receiver says fixed and is wrong: no receiver reports that. */
export const saysLooksWrong = ({ kind, flagWord }: Pick<LostFixRow, 'kind' | 'flagWord'>): boolean =>
  kind === 'flag' && flagWord === 'fixLooksWrong';

export function lostFixOf(record: LostFixRecord): LostFix {
  const { row, roverLabel, crewName, crewPhone, siteName, members, photos, advice } = record;
  const { flagAt, flagWord, flagNote, flagBy, takenAt, takenByUserId } = row;
  const { shelvedUntil, shelvedBy, shelfReason, closedAt, closedBy, confirmedCause, closingNote } = row;
  return {
    id: row.id,
    kind: row.kind,
    status: statusOf(row),
    roverId: row.roverId,
    roverLabel,
    crewId: row.crewId,
    crewName,
    crewPhone,
    siteName,
    mountPoint: row.mountPoint,
    startAt: row.startAt,
    raisedAt: row.raisedAt,
    endAt: row.endAt,
    ending: row.ending,
    pausedMs: row.pausedMs,
    sharedId: row.sharedId,
    members,
    flag:
      flagAt === null || flagWord === null
        ? null
        : { at: flagAt, word: flagWord, note: flagNote, by: flagBy ?? '' },
    taken:
      takenAt === null || takenByUserId === null
        ? null
        : { at: takenAt, by: record.takenBy ?? '', userId: takenByUserId },
    advice: advice && { ...advice, by: advice.by ?? '' },
    shelved:
      shelvedUntil === null ? null : { until: shelvedUntil, by: shelvedBy ?? '', reason: shelfReason ?? '' },
    diagnosis: row.diagnosis,
    diagnosisAtRaising: row.diagnosisAtRaising,
    isChattering: row.isChattering,
    photos,
    closed:
      closedAt === null || confirmedCause === null
        ? null
        : { at: closedAt, by: closedBy ?? '', cause: confirmedCause, note: closingNote },
  };
}

/** As a crew chief may see it: which other crews are on the mount point is not theirs to know. */
export function forChief(lostFix: LostFix): LostFix {
  if (lostFix.kind !== 'mountPoint') return lostFix;
  const own = (diagnosis: Diagnosis | null) =>
    diagnosis && { ...diagnosis, evidence: diagnosis.evidence.slice(0, 1) };
  return {
    ...lostFix,
    diagnosis: own(lostFix.diagnosis),
    diagnosisAtRaising: own(lostFix.diagnosisAtRaising),
  };
}
