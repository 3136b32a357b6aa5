import { Button } from '@fluentui/react-components';
import {
  pauseReasonLabels,
  pauseReasons,
  type PauseReason,
  type ShiftStep,
} from '@hubtack/contracts/shifts/shift.js';
import { useState } from 'react';
import { Sheet } from '../../components/sheet';
import { stepNames } from '../../lib/shift-steps';
import { stepsFrom, type ShiftNow } from './shift-now';
import { useTapping } from './use-tapping';

/** The steps that make sense now. A pause asks for its reason: one tap more, and nobody in the office need wonder. */
export function ShiftButtons({ crewId, shift }: { crewId: number; shift: ShiftNow }) {
  const { step } = useTapping(crewId);
  const [asksReason, setAsksReason] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const tap = async (which: ShiftStep, reason: PauseReason | null) => {
    setAsksReason(false);
    setProblem(null);
    try {
      await step(which, reason);
    } catch (error) {
      setProblem((error as Error).message);
    }
  };
  return (
    <>
      <div className="shift-buttons">
        {stepsFrom[shift.kind].map((which) => (
          <Button
            key={which}
            onClick={() => (which === 'pause' ? setAsksReason(true) : void tap(which, null))}
          >
            {stepNames[which]}
          </Button>
        ))}
      </div>
      {problem && <p role="alert">{problem}</p>}
      {asksReason && (
        <Sheet title="Pause" onClose={() => setAsksReason(false)}>
          <div className="my-crew-sheet pause-reasons">
            {pauseReasons.map((reason) => (
              <Button key={reason} onClick={() => void tap('pause', reason)}>
                {pauseReasonLabels[reason]}
              </Button>
            ))}
          </div>
        </Sheet>
      )}
    </>
  );
}
