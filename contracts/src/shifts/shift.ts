import { z } from 'zod';
import { id, instantMs, instantText } from '../common.js';
import { ribbonSpan, duty } from '../board/lane.js';
import { lostFix } from '../lost-fixes/lost-fix.js';

export const pauseReasons = ['driving', 'lunch', 'totalStation', 'other'] as const;
export const pauseReason = z.enum(pauseReasons);
export type PauseReason = z.infer<typeof pauseReason>;

export const pauseReasonLabels: Record<PauseReason, string> = {
  driving: 'Driving',
  lunch: 'Lunch',
  totalStation: 'Total-station work',
  other: 'Other',
};

export const shiftSteps = ['start', 'pause', 'resume', 'finish'] as const;
export const shiftStep = z.enum(shiftSteps);
export type ShiftStep = z.infer<typeof shiftStep>;

/** `at`: the time of the tap, when it comes later. `reason` belongs to a pause. */
export const shiftStepBody = z.object({
  at: instantText.optional(),
  reason: pauseReason.optional(),
});
export type ShiftStepBody = z.infer<typeof shiftStepBody>;

export const shiftPause = z.object({
  start: instantMs,
  end: instantMs.nullable(),
  reason: pauseReason,
  by: z.string().nullable(),
});
export type ShiftPause = z.infer<typeof shiftPause>;

/** A shift as marked, with who marked it; an end that is null has not come yet. */
export const shift = z.object({
  id,
  crewId: id,
  start: instantMs,
  end: instantMs.nullable(),
  startedBy: z.string().nullable(),
  endedBy: z.string().nullable(),
  pauses: z.array(shiftPause),
});
export type Shift = z.infer<typeof shift>;

const pauseBody = z.object({ start: instantText, end: instantText.nullable(), reason: pauseReason });

/** Marks set right afterwards. */
export const shiftBody = z
  .object({ start: instantText, end: instantText.nullable(), pauses: z.array(pauseBody).max(40) })
  .refine(({ start, end }) => end === null || Date.parse(end) > Date.parse(start), {
    path: ['end'],
    message: 'After the start',
  })
  .refine(
    ({ start, end, pauses }) =>
      pauses.every(
        (pause) =>
          Date.parse(pause.start) >= Date.parse(start) &&
          (pause.end === null ? end === null : Date.parse(pause.end) > Date.parse(pause.start)) &&
          (end === null || pause.end === null || Date.parse(pause.end) <= Date.parse(end)),
      ),
    {
      path: ['pauses'],
      message: 'Each pause inside the shift, and ended before it when the shift has ended',
    },
  );
export type ShiftBody = z.infer<typeof shiftBody>;

/** One local day of a crew, as its chief and the office see it. */
export const crewDay = z.object({
  crewId: id,
  crewName: z.string(),
  dayStart: instantMs,
  dayEnd: instantMs,
  basis: z.enum(['marks', 'pattern', 'noShiftSet']),
  duty,
  shifts: z.array(shift),
  /** On-shift intervals, pauses taken off; an open one runs to the end of the day. */
  onShift: z.array(z.object({ start: instantMs, end: instantMs })),
  rovers: z.array(z.object({ id, label: z.string(), spans: z.array(ribbonSpan) })),
  lostFixes: z.array(lostFix),
});
export type CrewDayView = z.infer<typeof crewDay>;
/** Sites that the crew's rovers were at on a day, as far as single positions are still kept. */
export const siteVisitList = z.array(
  z.object({ roverLabel: z.string(), siteName: z.string(), start: instantMs, end: instantMs }),
);
export type SiteVisitList = z.infer<typeof siteVisitList>;
export const crewDayQuery = z.object({
  date: z.iso.date().optional().describe('Local day; today when absent'),
});
