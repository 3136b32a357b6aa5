import { ingestEpoch, type IngestEpoch } from '@hubtack/contracts/ingest/ingest.js';
import type { Epoch } from '../fixes/epoch.js';
import type { Reject } from './sentence.batch.js';
import { refusalOf, type TimeLimits } from './time-limits.js';

const epochOf = (body: IngestEpoch): Epoch => {
  const hasPosition =
    body.latitude != null && body.longitude != null && (body.latitude !== 0 || body.longitude !== 0);
  return {
    time: Date.parse(body.time),
    quality: body.quality,
    satellites: body.satellites ?? null,
    hdop: body.hdop ?? null,
    ageMs: body.ageSeconds == null ? null : Math.round(body.ageSeconds * 1000),
    stationId: body.stationId == null ? null : Number(body.stationId),
    latitude: hasPosition && body.quality !== 0 ? body.latitude! : null,
    longitude: hasPosition && body.quality !== 0 ? body.longitude! : null,
    altitudeM: body.altitudeM ?? null,
    geoidSeparationM: body.geoidSeparationM ?? null,
    sigmaLatitudeM: null,
    sigmaLongitudeM: null,
    sigmaAltitudeM: null,
  };
};

/** Judges each epoch of a JSON post by itself; `line` is its 1-based place in the list. */
export function readEpochs(
  bodies: readonly unknown[],
  limits: TimeLimits,
): { epochs: Epoch[]; rejects: Reject[] } {
  const epochs: Epoch[] = [];
  const rejects: Reject[] = [];
  for (const [index, body] of bodies.entries()) {
    const line = index + 1;
    const result = ingestEpoch.safeParse(body);
    if (!result.success) {
      const issue = result.error.issues[0]!;
      const code =
        issue.path[0] === 'time' ? 'badDate' : issue.path[0] === 'quality' ? 'badQuality' : 'badField';
      rejects.push({ line, code, detail: `${issue.path.join('.')}: ${issue.message}` });
      continue;
    }
    const epoch = epochOf(result.data);
    const refusal = refusalOf(epoch.time, limits);
    if (refusal) rejects.push({ line, ...refusal });
    else epochs.push(epoch);
  }
  return { epochs, rejects };
}
