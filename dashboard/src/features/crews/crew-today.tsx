import { Button, MessageBar, MessageBarBody, Select } from '@fluentui/react-components';
import type { Duty } from '@hubtack/contracts/board/lane.js';
import type { Crew } from '@hubtack/contracts/crews/crew.js';
import {
  pauseReasonLabels,
  pauseReasons,
  type CrewDayView,
  type PauseReason,
  type Shift,
} from '@hubtack/contracts/shifts/shift.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Failed, Loading } from '../../components/query-states';
import { Sheet } from '../../components/sheet';
import { clockTime } from '../../lib/format';
import { useMe } from '../../lib/session';
import { officeDayQuery, useShiftStep } from '../../lib/shifts';
import { ShiftForm } from './shift-form';

const dutyWords: Record<Duty, string> = {
  onShift: 'On shift now.',
  paused: 'On a break now.',
  offShift: 'Off shift now.',
  noShiftSet: 'No shift is set for today: whatever is heard counts.',
};
const basisWords: Record<CrewDayView['basis'], string> = {
  marks: 'Counted by its marks.',
  pattern: 'Counted by its weekly pattern, until somebody marks something.',
  noShiftSet: '',
};

/** A crew's day from the office: the steps that its chief cannot make just now, and marks set right afterwards. */
export function CrewToday({ crew, onClose }: { crew: Crew; onClose: () => void }) {
  const { data: day, error, refetch } = useQuery(officeDayQuery(crew.id));
  const [editing, setEditing] = useState<Shift | 'new' | null>(null);
  const { role } = useMe();
  const maySetRight = role === 'dispatcher' || role === 'manager';
  const done = () => setEditing(null);
  return (
    <Sheet title={`${crew.name} today`} onClose={onClose}>
      <div className="crew-today">
        {error && !day && <Failed error={error} retry={() => void refetch()} />}
        {!day && !error && <Loading what="the day" />}
        {day && editing === null && (
          <>
            <p>
              {dutyWords[day.duty]} {basisWords[day.basis]}
            </p>
            {role !== 'technician' && <Steps crewId={crew.id} day={day} />}
            <Marks day={day} onEdit={maySetRight ? setEditing : null} />
            {maySetRight && <Button onClick={() => setEditing('new')}>Add a shift</Button>}
          </>
        )}
        {editing === 'new' && <ShiftForm crewId={crew.id} onDone={done} />}
        {editing !== null && editing !== 'new' && (
          <ShiftForm crewId={crew.id} shift={editing} onDone={done} />
        )}
      </div>
    </Sheet>
  );
}

function Steps({ crewId, day }: { crewId: number; day: CrewDayView }) {
  const step = useShiftStep(crewId);
  const [reason, setReason] = useState<PauseReason>('lunch');
  const isMarkedNow = day.basis === 'marks' && (day.duty === 'onShift' || day.duty === 'paused');
  return (
    <>
      <div className="crew-steps">
        {!isMarkedNow && (
          <Button disabled={step.isPending} onClick={() => step.mutate({ step: 'start' })}>
            Start
          </Button>
        )}
        {day.duty === 'onShift' && (
          <>
            <Select
              aria-label="Reason of the pause"
              value={reason}
              onChange={(_, { value }) => setReason(value as PauseReason)}
            >
              {pauseReasons.map((value) => (
                <option key={value} value={value}>
                  {pauseReasonLabels[value]}
                </option>
              ))}
            </Select>
            <Button disabled={step.isPending} onClick={() => step.mutate({ step: 'pause', reason })}>
              Pause
            </Button>
          </>
        )}
        {day.duty === 'paused' && (
          <Button disabled={step.isPending} onClick={() => step.mutate({ step: 'resume' })}>
            Resume
          </Button>
        )}
        {(day.duty === 'onShift' || day.duty === 'paused') && (
          <Button disabled={step.isPending} onClick={() => step.mutate({ step: 'finish' })}>
            Finish
          </Button>
        )}
      </div>
      {step.error && (
        <MessageBar intent="error">
          <MessageBarBody>{step.error.message}</MessageBarBody>
        </MessageBar>
      )}
    </>
  );
}

function Marks({ day, onEdit }: { day: CrewDayView; onEdit: ((shift: Shift) => void) | null }) {
  const { timeZone } = useMe();
  const time = (at: number | null) => (at === null ? 'open' : clockTime(at, timeZone));
  return (
    <ul className="crew-marks">
      {day.shifts.map((shift) => (
        <li key={shift.id}>
          <span>
            <strong>
              {time(shift.start)} – {time(shift.end)}
            </strong>{' '}
            <small>{[shift.startedBy, shift.endedBy].filter(Boolean).join(', ')}</small>
            {shift.pauses.map(({ start, end, reason, by }) => (
              <span key={start} className="crew-pause">
                {pauseReasonLabels[reason]} {time(start)} – {time(end)} <small>{by}</small>
              </span>
            ))}
          </span>
          {onEdit && (
            <Button size="small" onClick={() => onEdit(shift)}>
              Set right
            </Button>
          )}
        </li>
      ))}
    </ul>
  );
}
