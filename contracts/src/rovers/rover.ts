import { z } from 'zod';
import { id, instantText, optionalText, shortText } from '../common.js';

export const roverBody = z.object({
  label: shortText('a label such as R-07', 40),
  receiver: optionalText(120).default(null),
  serial: optionalText(80).default(null),
  correctionSourceId: id.nullable().default(null),
});
export type RoverBody = z.infer<typeof roverBody>;
export const changeRoverBody = roverBody.extend({ retired: z.boolean() });
export type ChangeRoverBody = z.infer<typeof changeRoverBody>;

export const rover = z.object({
  id,
  label: z.string(),
  receiver: z.string().nullable(),
  serial: z.string().nullable(),
  correctionSourceId: id.nullable(),
  mountPoint: z.string().nullable(),
  retired: z.boolean(),
  crewId: id.nullable(),
  crewName: z.string().nullable(),
  activeKeys: z.number().int(),
  lastHeardAt: instantText.nullable(),
});
export type Rover = z.infer<typeof rover>;
export const roverList = z.array(rover);

/** A key as it may be shown later: never the key itself, which is stored hashed. */
export const roverKey = z.object({
  id,
  hint: z.string().describe('The first characters, enough to tell keys apart'),
  createdAt: instantText,
  lastUsedAt: instantText.nullable(),
  revokedAt: instantText.nullable(),
});
export type RoverKey = z.infer<typeof roverKey>;
export const roverKeyList = z.array(roverKey);
/** The answer to issuing a key: the only time that it is shown. */
export const issuedRoverKey = z.object({ id, key: z.string() });
export type IssuedRoverKey = z.infer<typeof issuedRoverKey>;

/** A rover counts for the crew it was assigned to at that instant; `endAt` null is "still". */
export const roverAssignment = z.object({
  id,
  roverId: id,
  crewId: id,
  crewName: z.string(),
  startAt: instantText,
  endAt: instantText.nullable(),
});
export type RoverAssignment = z.infer<typeof roverAssignment>;
export const roverAssignmentList = z.array(roverAssignment);
/** Assigns from an instant on (now when absent); crewId null takes the rover off its crew. */
export const assignRoverBody = z.object({ crewId: id.nullable(), startAt: instantText.optional() });
export type AssignRoverBody = z.infer<typeof assignRoverBody>;
