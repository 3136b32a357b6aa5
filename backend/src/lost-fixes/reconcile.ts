import type { LostFixKind } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { Episode } from './detector.js';

/** What of a stored lost fix decides which episode it is. */
export interface StoredEpisode {
  id: number;
  kind: LostFixKind;
  start: number;
  end: number | null;
  isWithdrawn: boolean;
}

export interface Reconciled {
  insert: Episode[];
  /** Stored ones as they are to stand now, changed or not. */
  keep: { id: number; episode: Episode }[];
  /** No longer there: sentences that came late show that there was none. */
  withdraw: number[];
}

/** A chief's flag shortly before the fix is gone for long enough is about the same loss. */
const FLAG_BEFORE_MS = 5 * 60_000;

interface Pair {
  stored: StoredEpisode;
  episode: Episode;
  isSameKind: boolean;
  overlapMs: number;
}

/**
 * Which stored lost fixes of one rover the episodes of its timeline are. Each keeps its notes and photos when sentences that come late
 * move its ends: the pair that overlaps most belongs together. Running it again changes nothing.
 */
export function reconcile(stored: readonly StoredEpisode[], episodes: readonly Episode[]): Reconciled {
  const pairs = stored
    .flatMap((row) => nearTo(row, episodes))
    .filter((pair) => pair.overlapMs >= 0)
    .toSorted(
      (a, b) =>
        Number(b.isSameKind) - Number(a.isSameKind) ||
        b.overlapMs - a.overlapMs ||
        a.stored.id - b.stored.id ||
        a.episode.start - b.episode.start,
    );
  const usedIds = new Set<number>();
  const used = new Set<Episode>();
  const keep: Reconciled['keep'] = [];
  for (const { stored: row, episode } of pairs) {
    if (usedIds.has(row.id) || used.has(episode)) continue;
    usedIds.add(row.id);
    used.add(episode);
    keep.push({ id: row.id, episode });
  }
  return {
    insert: episodes.filter((episode) => !used.has(episode)),
    keep,
    withdraw: stored
      .filter((row) => !usedIds.has(row.id) && row.kind !== 'flag' && !row.isWithdrawn)
      .map(({ id }) => id),
  };
}

/** Episodes come in order and do not overlap: those that a row may be are neighbours. */
function nearTo(row: StoredEpisode, episodes: readonly Episode[]): Pair[] {
  const slack = row.kind === 'flag' ? FLAG_BEFORE_MS : 0;
  const last = row.kind === 'flag' ? row.start : (row.end ?? Infinity);
  let low = 0;
  let high = episodes.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((episodes[middle]!.end ?? Infinity) < row.start - slack) low = middle + 1;
    else high = middle;
  }
  const pairs: Pair[] = [];
  for (let at = low; at < episodes.length && episodes[at]!.start <= last + slack; at++)
    pairs.push(pairOf(row, episodes[at]!));
  return pairs;
}

/** Overlap below zero: they do not touch. */
function pairOf(stored: StoredEpisode, episode: Episode): Pair {
  const earliest = stored.kind === 'flag' ? stored.start - FLAG_BEFORE_MS : stored.start;
  const start = Math.max(earliest, episode.start);
  // A flag reaches forward as well: it is made before the loss has lasted long enough to be raised.
  const storedEnd = stored.kind === 'flag' ? stored.start + FLAG_BEFORE_MS : (stored.end ?? Infinity);
  const end = Math.min(storedEnd, episode.end ?? Infinity);
  return { stored, episode, isSameKind: stored.kind === episode.kind, overlapMs: end - start };
}
