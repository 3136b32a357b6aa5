import type { CrewDayView, PauseReason, Shift, ShiftStep } from '@hubtack/contracts/shifts/shift.js';

/** How the shift stands; what the phone has yet to send counts already. */
export type ShiftNow =
  | { kind: 'none' }
  | { kind: 'running'; since: number }
  | { kind: 'paused'; since: number; reason: PauseReason | null };

/** A step that waits on the phone. */
export interface WaitingStep {
  step: ShiftStep;
  at: number;
  reason: PauseReason | null;
}

function standing(shifts: readonly Shift[]): ShiftNow {
  const open = shifts.findLast(({ end }) => end === null);
  if (!open) return { kind: 'none' };
  const pause = open.pauses.findLast(({ end }) => end === null);
  return pause
    ? { kind: 'paused', since: pause.start, reason: pause.reason }
    : { kind: 'running', since: open.start };
}

function after(now: ShiftNow, { step, at, reason }: WaitingStep): ShiftNow {
  switch (step) {
    case 'start':
      return now.kind === 'none' ? { kind: 'running', since: at } : now;
    case 'pause':
      return now.kind === 'running' ? { kind: 'paused', since: at, reason } : now;
    case 'resume':
      return now.kind === 'paused' ? { kind: 'running', since: at } : now;
    case 'finish':
      return { kind: 'none' };
  }
}

export const shiftNow = (
  day: Pick<CrewDayView, 'shifts'> | undefined,
  waiting: readonly WaitingStep[],
): ShiftNow => waiting.reduce(after, standing(day?.shifts ?? []));

/** The steps that make sense now. */
export const stepsFrom: Record<ShiftNow['kind'], readonly ShiftStep[]> = {
  none: ['start'],
  running: ['pause', 'finish'],
  paused: ['resume', 'finish'],
};
