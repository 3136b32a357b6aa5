import type { PauseReason, ShiftStep } from '@hubtack/contracts/shifts/shift.js';

export interface MarkedPause {
  id: number;
  start: number;
  end: number | null;
}

/** A shift as marked, or as the pattern plans it (id null: nothing is marked yet). */
export interface StepShift {
  id: number | null;
  start: number;
  end: number | null;
  /** Somebody has marked its end; a planned end has not come about by being planned. */
  isFinished: boolean;
  pauses: readonly MarkedPause[];
}

/** What a step writes. `shift` is the planned one made into marks when nothing was marked yet. */
export type StepEffect =
  | { do: 'start'; at: number }
  | { do: 'pause'; shift: StepShift; at: number; reason: PauseReason }
  | { do: 'resume'; pauseId: number; at: number }
  | { do: 'finish'; shift: StepShift; at: number; openPauseId: number | null };

export type StepResult = { effect: StepEffect } | { refusal: string };

/**
 * What a step at the instant `at` does to a crew's shift. `current`: the shift that `at` lies in, marked or planned; `later`: start of
 * the next marked one. `clock` writes an instant for people. A step that says what is so already is refused, and says what is so.
 */
export function stepOf(
  step: ShiftStep,
  at: number,
  reason: PauseReason | undefined,
  current: StepShift | null,
  later: number | null,
  clock: (instant: number) => string,
): StepResult {
  const openPause = current?.pauses.find((pause) => pause.end === null) ?? null;
  const pausedAt = current?.pauses.find(({ start, end }) => start <= at && at < (end ?? Infinity)) ?? null;
  const laterPause = current?.pauses.find(({ start }) => start > at) ?? null;
  if (step === 'start') {
    if (current && current.id !== null)
      return { refusal: `The shift has been running since ${clock(current.start)}.` };
    if (later !== null) return { refusal: `A shift that begins at ${clock(later)} is marked already.` };
    return { effect: { do: 'start', at } };
  }
  if (!current) return { refusal: `No shift is running at ${clock(at)}. Start it first.` };
  if (laterPause)
    return { refusal: `A pause at ${clock(laterPause.start)}, later than this, is marked already.` };
  switch (step) {
    case 'pause':
      if (pausedAt) return { refusal: `The shift has been paused since ${clock(pausedAt.start)}.` };
      if (reason === undefined) return { refusal: 'A pause needs a reason.' };
      return { effect: { do: 'pause', shift: current, at, reason } };
    case 'resume':
      if (!openPause || openPause.start >= at) return { refusal: `The shift is not paused at ${clock(at)}.` };
      return { effect: { do: 'resume', pauseId: openPause.id, at } };
    case 'finish':
      if (at <= current.start) return { refusal: `The shift has only begun at ${clock(current.start)}.` };
      if (current.isFinished) return { refusal: `The shift was finished at ${clock(current.end!)}.` };
      if (pausedAt && pausedAt.end !== null)
        return { refusal: `A pause until ${clock(pausedAt.end)}, later than this, is marked already.` };
      return { effect: { do: 'finish', shift: current, at, openPauseId: openPause?.id ?? null } };
  }
}
