import type { FlagBody } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { PauseReason, ShiftStep, ShiftStepBody } from '@hubtack/contracts/shifts/shift.js';
import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useMemo } from 'react';
import { flagAnswer, flagCalled, flagPath, photosPath } from '../../lib/flags';
import { crewDayQuery, putDay, putLostFix } from '../../lib/my-crew';
import { useMe } from '../../lib/session';
import { shiftStepPath, stepAnswer, stepCalled } from '../../lib/shift-steps';
import { boardQuery } from '../../live/board-query';
import { newId } from '../../offline/new-id';
import type { NewTap } from '../../offline/tap';
import { taps } from '../../offline/taps';

/** Below this the difference of the clocks is the way and the batching of the stream. */
const CLOCK_NOISE_MS = 2000;

/** What a chief can tap. Each is kept on the phone first; sending comes after. */
export function useTapping(crewId: number) {
  const client = useQueryClient();
  const { userId } = useMe();
  return useMemo(() => {
    const make = (
      tap: Pick<NewTap, 'kind' | 'words' | 'url' | 'body' | 'at'> & { under?: string },
    ): NewTap => ({
      under: null,
      ...tap,
      id: newId(),
      userId: userId!,
      refusal: null,
    });
    /** By the server's clock where this phone's is off. */
    const tappedAt = () => {
      const offsetMs = client.getQueryData(boardQuery.queryKey)?.clockOffsetMs ?? 0;
      return Date.now() + (Math.abs(offsetMs) < CLOCK_NOISE_MS ? 0 : offsetMs);
    };
    return {
      step: (step: ShiftStep, reason: PauseReason | null) => {
        const at = tappedAt();
        const body: ShiftStepBody = {
          at: new Date(at).toISOString(),
          ...(reason === null ? {} : { reason }),
        };
        const words = stepCalled(step, reason);
        return taps.add([make({ kind: 'shift', words, url: shiftStepPath(crewId, step), body, at })]);
      },
      flag: (said: Omit<FlagBody, 'at'>, photos: readonly Blob[]) => {
        const at = tappedAt();
        const body: FlagBody = { ...said, at: new Date(at).toISOString() };
        const flag = make({ kind: 'flag', words: flagCalled(body), url: flagPath, body, at });
        const pictures = photos.map((photo, index) =>
          make({
            kind: 'photo',
            words: `Photo ${index + 1} of ${photos.length}`,
            url: photosPath(':under'),
            body: photo,
            at,
            under: flag.id,
          }),
        );
        return taps.add([flag, ...pictures]);
      },
    };
  }, [client, crewId, userId]);
}

/** What the server answers to a tap is on screen before the tap stops being shown as waiting. */
export function useTapAnswers(crewId: number): void {
  const client = useQueryClient();
  useEffect(() => {
    const stop = taps.onDone(async ({ kind }, answer) => {
      const day = kind === 'shift' ? stepAnswer(answer) : null;
      if (day) await putDay(client, day);
      const lostFix = kind === 'flag' ? flagAnswer(answer) : null;
      if (lostFix) await putLostFix(client, crewId, lostFix);
      // An answer that is given again is of the first time.
      void client.invalidateQueries({ queryKey: crewDayQuery(crewId).queryKey });
    });
    taps.nudge();
    return stop;
  }, [client, crewId]);
}
