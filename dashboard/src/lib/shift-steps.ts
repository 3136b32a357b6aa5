import {
  crewDay,
  pauseReasonLabels,
  type PauseReason,
  type ShiftStep,
} from '@hubtack/contracts/shifts/shift.js';

export const shiftStepPath = (crewId: number, step: ShiftStep) => `/api/crews/${crewId}/shift/${step}`;

export const stepNames: Record<ShiftStep, string> = {
  start: 'Start shift',
  pause: 'Pause',
  resume: 'Resume',
  finish: 'Finish shift',
};

export const stepCalled = (step: ShiftStep, reason: PauseReason | null): string =>
  reason === null ? stepNames[step] : `${stepNames[step]}: ${pauseReasonLabels[reason].toLowerCase()}`;

/** The day after a step, or null when a newer server says it in a way this page cannot read. */
export const stepAnswer = (answer: unknown) => crewDay.safeParse(answer).data ?? null;
