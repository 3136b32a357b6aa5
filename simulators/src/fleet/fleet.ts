import { setTimeout as delay } from 'node:timers/promises';
import type { CrewStory } from '../scenarios/scenarios.js';
import type { FleetRover } from './rover-keys.js';
import type { RoverLink } from './rover-link.js';
import { SimulatedRover } from './simulated-rover.js';

export interface FleetOptions {
  rovers: readonly FleetRover[];
  /** What each crew does, by number. */
  story: (crew: number) => CrewStory;
  seed: number;
  /** Simulated seconds in a second. */
  speed: number;
  /** Stops by itself after so many simulated seconds; null runs until stopped. */
  durationSeconds: number | null;
  link: (rover: FleetRover) => RoverLink;
  signal?: AbortSignal;
  onProblem?: (label: string, error: Error) => void;
}

const METRES_A_DEGREE = 111_320;

function simulatedRover(
  rover: FleetRover,
  { behaviours, stands, northM = 0 }: CrewStory,
  seed: number,
): SimulatedRover {
  const site = { latitude: rover.latitude + northM / METRES_A_DEGREE, longitude: rover.longitude };
  return new SimulatedRover(site, behaviours, seed, stands);
}

/** Runs a fleet: each rover sends once a simulated second, on the second, as receivers do. */
export async function runFleet(options: FleetOptions): Promise<void> {
  const { rovers, story, seed, speed, durationSeconds, signal } = options;
  const fleet = rovers.map((rover, index) => ({
    rover,
    link: options.link(rover),
    simulated: simulatedRover(rover, story(index), seed * 1000 + index),
    busy: false,
  }));
  const start = Math.ceil(Date.now() / 1000) * 1000;
  const seconds = durationSeconds ?? Infinity;
  for (let second = 0; second < seconds; second++) {
    const dueAt = start + (second * 1000) / speed;
    const wait = dueAt - Date.now();
    if (wait > 0) await delay(wait, undefined, signal ? { signal } : {}).catch(() => undefined);
    if (signal?.aborted) break;
    // At higher speed the simulated clock would run ahead of the server's: time is then counted back from now.
    const time = speed === 1 ? dueAt : Math.round(Date.now() / 10) * 10;
    for (const unit of fleet) {
      const sentences = unit.simulated.sentencesAt(time, second);
      if (sentences === '' || unit.busy) continue;
      unit.busy = true;
      unit.link
        .send(sentences)
        .catch((error: unknown) => options.onProblem?.(unit.rover.label, error as Error))
        .finally(() => {
          unit.busy = false;
        });
    }
  }
  for (const { link } of fleet) link.close();
}
