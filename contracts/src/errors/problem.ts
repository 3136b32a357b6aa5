import { z } from 'zod';

/** Stable codes of every refusal; clients match on these, never on the words (RFC 9457 `code` extension). */
export const problemCodes = [
  'badRequest',
  'invalidBody',
  'unreadable',
  'unauthenticated',
  'wrongSignIn',
  'signInEnded',
  'tokenReused',
  'linkInvalid',
  'badOrigin',
  'forbidden',
  'notFound',
  'conflict',
  'roverKeyUnknown',
  'roverKeyRevoked',
  'tooLarge',
  'unsupportedMediaType',
  'tooManyRequests',
  'casterProblem',
  'needsConfirmation',
  'storageBusy',
  'storageFull',
  'stopping',
  'internal',
] as const;
export const problemCode = z.enum(problemCodes);
export type ProblemCode = z.infer<typeof problemCode>;

/** RFC 9457 problem details. `errors` points at the field that is wrong, so that a form can say so beside it. */
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string().optional(),
  code: problemCode,
  correlationId: z.string(),
  errors: z.array(z.object({ pointer: z.string(), detail: z.string() })).optional(),
});
export type Problem = z.infer<typeof problem>;
