import { z } from 'zod';
import { id, latitude, longitude, optionalText, shortText } from '../common.js';

/** What a height counts from: the ellipsoid, or the geoid ("mean sea level" in everyday words). */
export const heightKind = z.enum(['ellipsoidal', 'geoid']);
export type HeightKind = z.infer<typeof heightKind>;

/** A mark whose position is known: what a rover is checked against. */
export const controlPointBody = z.object({
  name: shortText('the name of the control point'),
  latitude,
  longitude,
  /** Metres. */
  height: z
    .number()
    .min(-1000, 'Between -1000 and 10000 metres')
    .max(10_000, 'Between -1000 and 10000 metres')
    .nullable(),
  heightKind,
  /** Datum and epoch in the surveyor's words: nothing is transformed. */
  datum: optionalText(80),
  note: optionalText(),
});
export type ControlPointBody = z.infer<typeof controlPointBody>;
export const changeControlPointBody = controlPointBody.extend({ active: z.boolean() });
export type ChangeControlPointBody = z.infer<typeof changeControlPointBody>;
export const controlPoint = changeControlPointBody.extend({ id });
export type ControlPoint = z.infer<typeof controlPoint>;
export const controlPointList = z.array(controlPoint);
