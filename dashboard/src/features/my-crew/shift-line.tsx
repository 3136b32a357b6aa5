import { pauseReasonLabels, type CrewDayView } from '@hubtack/contracts/shifts/shift.js';
import { clockTime } from '../../lib/format';
import type { ShiftNow } from './shift-now';

interface ShiftLineProps {
  shift: ShiftNow;
  day: CrewDayView | undefined;
  zone: string;
}

/** The shift in words. */
export function ShiftLine({ shift, day, zone }: ShiftLineProps) {
  const words = () => {
    switch (shift.kind) {
      case 'running':
        return `On shift since ${clockTime(shift.since, zone)}`;
      case 'paused': {
        const reason = shift.reason === null ? '' : `: ${pauseReasonLabels[shift.reason].toLowerCase()}`;
        return `Paused since ${clockTime(shift.since, zone)}${reason}`;
      }
      case 'none': {
        const last = day?.shifts.at(-1);
        if (last?.end) return `Shift finished at ${clockTime(last.end, zone)}`;
        return day?.basis === 'pattern' ? 'By the weekly pattern; not started by you' : 'No shift started';
      }
    }
  };
  return <p className="shift-line">{words()}</p>;
}
