import type { Epoch } from '../fixes/epoch.js';
import type { MeanPosition } from './mean-position.js';

type Used = Pick<Epoch, 'time' | 'ageMs' | 'stationId'>;

/** A mean of fewer says little of itself. */
const FEW_EPOCHS = 5;
/** More scatter than this is a pole that moved, or a fix that was none (common practice, no source). */
const SCATTER_M = 0.03;
/** Who stands on a mark and waits is heard without such a pause; across one the crew may have walked. */
const PAUSE_MS = 30_000;

const words = (ms: number): string =>
  ms < 120_000 ? `${Math.round(ms / 1000)} s` : `${Math.round(ms / 60_000)} min`;

/** What speaks against a mean, in words. `epochs`: those that went into it, in order of time; at least one. Times in ms UTC. */
export function epochWarnings(
  epochs: readonly Used[],
  scatter: MeanPosition['scatter'],
  { now, maxAgeMs }: { now: number; maxAgeMs: number },
): string[] {
  const warnings: string[] = [];
  if (epochs.length < FEW_EPOCHS) warnings.push('Few epochs: a mean of ten or more says more.');
  if (scatter && Math.hypot(scatter.eastM, scatter.northM) > SCATTER_M)
    warnings.push('The epochs scatter widely: did the pole stand still?');
  const pauseMs = Math.max(0, ...epochs.slice(1).map(({ time }, index) => time - epochs[index]!.time));
  if (pauseMs > PAUSE_MS)
    warnings.push(
      `Among these epochs is a pause of ${words(pauseMs)}: did the pole stand on the mark all along?`,
    );
  const oldMs = now - epochs.at(-1)!.time;
  if (oldMs > PAUSE_MS)
    warnings.push(`The newest fixed epoch is ${words(oldMs)} old: was the pole on the mark then?`);
  const ageMs = Math.max(0, ...epochs.map((epoch) => epoch.ageMs ?? 0));
  if (ageMs > maxAgeMs)
    warnings.push(`Corrections were up to ${words(ageMs)} old: “fixed” is worth less then.`);
  if (new Set(epochs.map(({ stationId }) => stationId)).size > 1)
    warnings.push('The base changed among these epochs: take the shot again.');
  return warnings;
}
