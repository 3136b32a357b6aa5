import { shiftStep, shiftStepBody } from '@hubtack/contracts/shifts/shift.js';
import type { Tap } from '../../offline/tap';
import type { WaitingStep } from './shift-now';

/** Steps of the shift among what waits to be sent, read back from what will be sent. */
export const waitingSteps = (waiting: readonly Tap[]): WaitingStep[] =>
  waiting.flatMap(({ kind, url, body, at }) => {
    const step = shiftStep.safeParse(url.split('/').at(-1));
    if (kind !== 'shift' || !step.success) return [];
    return [{ step: step.data, at, reason: shiftStepBody.safeParse(body).data?.reason ?? null }];
  });
