/** Whether what is on screen is of now. Kept outside React: it changes with every beat. */
export interface StreamStatus {
  /** ms, this machine's clock; null before anything was heard. */
  lastHeardAt: number | null;
  /** Since when the stream is broken; null while it is open. */
  cutSince: number | null;
}

export type Freshness =
  | { kind: 'connecting' }
  | { kind: 'live' }
  | { kind: 'delayed'; ms: number }
  | { kind: 'cut'; since: number };

/** A beat comes after ten seconds of silence: beyond this, something is held up on the way. */
const DELAYED_MS = 13_000;
/** A break that heals by itself within this time is not worth a word. */
const CUT_MS = 4000;

export function freshnessOf(status: StreamStatus, now: number): Freshness {
  if (status.lastHeardAt === null && status.cutSince === null) return { kind: 'connecting' };
  if (status.cutSince !== null && now - status.cutSince > CUT_MS)
    return { kind: 'cut', since: status.cutSince };
  const silentMs = now - (status.lastHeardAt ?? now);
  return silentMs > DELAYED_MS ? { kind: 'delayed', ms: silentMs } : { kind: 'live' };
}
