import { z } from 'zod';
import { instantText, latitude, longitude } from '../common.js';

/** Why a sentence or an epoch was not taken. Stable: senders and metrics match on them. */
export const rejectReasons = [
  'badChecksum',
  'noChecksum',
  'malformed',
  'badField',
  'badQuality',
  'tooLong',
  'cutShort',
  'untimed',
  'tooOld',
  'inFuture',
  'badDate',
] as const;
export const rejectReason = z.enum(rejectReasons);
export type RejectReason = z.infer<typeof rejectReason>;

/** Answer to a rover's post, given only after what it accepted is durable. Counts are of sentences or epochs. */
export const ingestAnswer = z.object({
  accepted: z.number().int(),
  duplicates: z.number().int(),
  ignored: z.number().int().describe('Readable but not needed, and bytes that are no sentence at all'),
  rejected: z.number().int(),
  reasons: z
    .array(z.object({ line: z.number().int().describe('1-based'), code: rejectReason, detail: z.string() }))
    .max(20),
});
export type IngestAnswer = z.infer<typeof ingestAnswer>;

/** UTC date of the first sentence of a stored log; sentences carry a time of day but no date. */
export const ingestQuery = z.object({
  date: z.iso.date('Write the UTC date of the first sentence as YYYY-MM-DD').optional(),
});
export type IngestQuery = z.infer<typeof ingestQuery>;

/** One fix epoch as JSON. Each is judged by itself: a bad one never costs a good one. */
export const ingestEpoch = z.object({
  time: instantText,
  quality: z.number().int().min(0).max(9),
  satellites: z.number().int().min(0).max(200).nullish(),
  hdop: z.number().min(0).max(1000).nullish(),
  ageSeconds: z.number().min(0).max(1_000_000).nullish(),
  stationId: z.union([z.string().regex(/^\d{1,5}$/), z.number().int().min(0).max(99_999)]).nullish(),
  latitude: latitude.nullish(),
  longitude: longitude.nullish(),
  altitudeM: z.number().min(-20_000).max(100_000).nullish(),
  geoidSeparationM: z.number().min(-1000).max(1000).nullish(),
});
export type IngestEpoch = z.infer<typeof ingestEpoch>;
export const ingestEpochsBody = z.object({ epochs: z.array(z.unknown()).max(20_000) });
