import type { Outcome, Tap, TapStore } from './tap';

const FIRST_WAIT_MS = 2000;
const LONGEST_WAIT_MS = 60_000;
/** A server may ask for longer, within reason. */
const LONGEST_ASKED_MS = 300_000;

const mayGo = (tap: Tap, userId: number): boolean =>
  tap.userId === userId && tap.under === null && tap.refusal === null;

/**
 * The oldest tap that may go. Photos let words pass: a picture that takes minutes on a weak signal must not hold up
 * "Finish", and its place among the others means nothing.
 */
export function nextTap(taps: readonly Tap[], userId: number): Tap | undefined {
  const sendable = taps.filter((tap) => mayGo(tap, userId));
  return sendable.find(({ kind }) => kind !== 'photo') ?? sendable[0];
}

const release = (tap: Tap, answerId: number): Tap => ({
  ...tap,
  under: null,
  url: tap.url.replace(':under', String(answerId)),
});

/** The ids that leave with a refused tap once it has been read: itself, and what hangs under it. */
export const dismissed = (taps: readonly Tap[], id: string): string[] =>
  taps.filter((tap) => tap.id === id || tap.under === id).map((tap) => tap.id);

export type DrainEnd =
  { kind: 'empty' } | { kind: 'signIn' } | { kind: 'later'; waitMs: number | null; moved: boolean };

export interface DrainParts {
  store: TapStore;
  send: (tap: Tap) => Promise<Outcome>;
  /** Who is signed in, asked anew before each tap. */
  whose: () => number | null;
  /** A tap was answered; called before it leaves the store, so that what it changed is on screen by then. */
  onDone: (tap: Tap, answer: unknown) => Promise<void>;
}

/**
 * Sends what waits, one at a time, until nothing is left or something stands in the way. A page that closes between an
 * answer and the store leaves the tap there: it is sent again with its key, and the server gives the first answer again.
 */
export async function drain({ store, send, whose, onDone }: DrainParts): Promise<DrainEnd> {
  for (let moved = false; ; moved = true) {
    const userId = whose();
    if (userId === null) return { kind: 'signIn' };
    const tap = nextTap(await store.all(), userId);
    if (!tap) return { kind: 'empty' };
    const outcome = await send(tap);
    switch (outcome.kind) {
      case 'later':
        return { kind: 'later', waitMs: outcome.waitMs, moved };
      case 'signIn':
        return { kind: 'signIn' };
      case 'refused':
        await store.settle([], [{ ...tap, refusal: outcome.reason }]);
        break;
      case 'done': {
        await onDone(tap, outcome.answer);
        const under = (await store.all()).filter((other) => other.under === tap.id);
        await store.settle(
          [tap.id],
          under.map((other) => release(other, outcome.answerId)),
        );
      }
    }
  }
}

/**
 * How long until the next try: doubling from two seconds to a minute, spread so that the phones of a firm do not come
 * back together; never sooner than the server asked. `chance` is in [0, 1).
 */
export function waitBeforeMs(failures: number, askedMs: number | null, chance: number): number {
  const backOff = Math.min(LONGEST_WAIT_MS, FIRST_WAIT_MS * 2 ** Math.max(0, failures - 1));
  return Math.max(backOff * (0.7 + chance * 0.6), Math.min(askedMs ?? 0, LONGEST_ASKED_MS));
}
