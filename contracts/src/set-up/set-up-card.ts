import { z } from 'zod';
import { id, instantText, optionalText } from '../common.js';
import { correctionFormat } from '../corrections/correction-source.js';
import { fixState } from '../fixes/fix-state.js';

/** What the pole height reaches up to. */
export const measuringPoints = ['mountBottom', 'phaseCentre'] as const;
export const measuringPoint = z.enum(measuringPoints);
export type MeasuringPoint = z.infer<typeof measuringPoint>;

export const measuringPointLabels: Record<MeasuringPoint, string> = {
  mountBottom: 'Bottom of the antenna mount',
  phaseCentre: 'Antenna phase centre',
};

export const tiltStates = ['off', 'calibrated', 'notCalibrated'] as const;
export const tiltState = z.enum(tiltStates);
export type TiltState = z.infer<typeof tiltState>;

export const tiltLabels: Record<TiltState, string> = {
  off: 'Off, pole held upright by its bubble',
  calibrated: 'On and calibrated today',
  notCalibrated: 'On, not calibrated',
};

/** What can be doubtful about a card against the one before: each is asked about once more. */
export const setUpDoubts = [
  'poleStep',
  'eighteenAgainstTwenty',
  'poleUnusual',
  'tiltNotCalibrated',
  'offsetUnusual',
] as const;
export const setUpDoubt = z.enum(setUpDoubts);
export type SetUpDoubt = z.infer<typeof setUpDoubt>;

export const setUpCardBody = z.object({
  roverId: id,
  /** Metres. */
  poleHeightM: z.number().min(0, 'At least 0').max(10, 'At most 10 metres'),
  measuringPoint,
  /** From the measuring point up to the phase centre, metres; 0 when the pole height reaches up to it. */
  antennaOffsetM: z.number().min(-0.5, 'Between -0.5 and 1 metre').max(1, 'Between -0.5 and 1 metre'),
  tilt: tiltState,
  correctionSourceId: id.nullable(),
  messageFormat: correctionFormat,
  /** The firm's tolerance profile that is worked to, by name. */
  toleranceProfile: optionalText(40),
  checkedBy: z.string().trim().min(1, 'Write who checked it').max(80, 'At most 80 characters'),
  note: optionalText().default(null),
  /** Doubts that somebody was asked about and stands by. */
  confirmed: z.array(setUpDoubt).default([]),
  at: instantText.optional().describe('The time of the tap, when it comes later'),
});
export type SetUpCardBody = z.infer<typeof setUpCardBody>;

export const setUpCard = z.object({
  id,
  roverId: id,
  roverLabel: z.string(),
  crewId: id.nullable().describe('Whose the rover was'),
  at: instantText,
  by: z.string(),
  poleHeightM: z.number(),
  measuringPoint,
  antennaOffsetM: z.number(),
  tilt: tiltState,
  correctionSourceId: id.nullable(),
  sourceName: z.string().nullable(),
  mountPoint: z.string().nullable(),
  messageFormat: correctionFormat,
  toleranceProfile: z.string().nullable(),
  checkedBy: z.string(),
  note: z.string().nullable(),
  confirmed: z.array(setUpDoubt),
});
export type SetUpCard = z.infer<typeof setUpCard>;
export const setUpCardList = z.object({ cards: z.array(setUpCard) });
export const setUpCardQuery = z.object({ roverId: z.coerce.number().int().positive() });

/** What a new card starts from. */
export const setUpStart = z.object({
  card: setUpCard.nullable().describe('The newest there is'),
  choices: z.array(z.object({ id, name: z.string(), mountPoint: z.string() })),
  correctionSourceId: id.nullable().describe('What the office has set for the rover'),
  toleranceProfile: z.string().describe('What the crew’s work is judged by'),
  profiles: z.array(z.string()),
});
export type SetUpStart = z.infer<typeof setUpStart>;

export const groundQuery = z.object({
  roverId: z.coerce.number().int().positive(),
  poleHeightM: z.coerce.number().min(0).max(10),
  antennaOffsetM: z.coerce.number().min(-0.5).max(1).default(0),
  measuringPoint: measuringPoint.default('mountBottom'),
});
export type GroundQuery = z.infer<typeof groundQuery>;

/** Height of the ground under the pole by the newest sentence; all null before there is one. */
export const ground = z.object({
  at: instantText.nullable(),
  state: fixState,
  aboveGeoidM: z.number().nullable(),
  aboveEllipsoidM: z.number().nullable(),
});
export type Ground = z.infer<typeof ground>;
