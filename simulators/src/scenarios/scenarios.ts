import {
  correctionsStopped,
  neverCorrected,
  quiet,
  steady,
  trees,
  unrest,
  type Behaviour,
} from './behaviour.js';
import type { DayCrew, Marks } from './day.js';
import { days } from './days.js';
import type { SimulatedCause } from './loss-case.js';
import { planLoss, type Loss } from './losses.js';
import { randomOf } from './random.js';

/** What a crew of a fleet does, and what is true of it where that is known. */
export interface CrewStory {
  behaviours: Behaviour[];
  losses: Loss[];
  marks: Marks | null;
  /** Metres north of where its keys say it works. */
  northM?: number;
  /** Its pole stays on one mark; otherwise the crew walks about. */
  stands?: boolean;
}

/** Stories of the crews of a fleet, by number. */
export type Scenario = (seed: number) => (crew: number) => CrewStory;

const YEAR = 366 * 86_400;
/** Beyond the longest distance to a base that is usual. */
const FAR_M = 32_000;

const plain =
  (behaviours: (crew: number) => Behaviour[]): Scenario =>
  () =>
  (crew) => ({ behaviours: behaviours(crew), losses: [], marks: null });

/**
 * Something happens within the first minute: one under trees, one without corrections, one quiet, one never fixed. After four minutes the
 * base station of the first two fails for both.
 */
const demoBehaviours = (crew: number): Behaviour[] => {
  const rounds = Array.from({ length: 200 }, (_, round) => round * 420);
  const baseFails = rounds.map((at) => correctionsStopped(at + 240, 110));
  switch (crew % 6) {
    case 3:
      return [steady(4), ...rounds.map((at) => trees(at + 25, 150))];
    case 1:
      return [steady(4), ...rounds.map((at) => correctionsStopped(at + 35, 120)), ...baseFails];
    case 0:
      return [steady(4), unrest(900), ...baseFails];
    case 4:
      return [steady(4), quiet(30, YEAR)];
    case 5:
      return [steady(4), neverCorrected()];
    default:
      return [steady(4), unrest(900)];
  }
};
/** The third crew's pole stands on a control point, for check shots. */
const demo: Scenario = () => (crew) => ({
  behaviours: demoBehaviours(crew),
  losses: [],
  marks: null,
  stands: crew % 6 === 2,
});

/** Every crew loses its fix for one cause, one crew a little after the other. */
const losing =
  (cause: SimulatedCause): Scenario =>
  (seed) =>
  (crew) => {
    const isFromStart = cause === 'neverCorrected' || cause === 'notHeard';
    const from = isFromStart ? 0 : 120 + (cause === 'mountPointDown' ? 0 : crew * 7);
    const random = randomOf(seed * 1000 + crew);
    const { loss, behaviour } = planLoss(cause, from, from + (isFromStart ? 900 : 180), random);
    const northM = cause === 'farFromBase' ? FAR_M : 0;
    return { behaviours: [steady(), behaviour], losses: [loss], marks: null, northM };
  };

const ofDay =
  (name: keyof typeof days): Scenario =>
  (seed) => {
    const { crews } = days[name](seed);
    return (crew) => crews[crew % crews.length]! satisfies DayCrew;
  };

export const scenarios = {
  steady: plain(() => [steady()]),
  unrest: plain(() => [steady(), unrest(300)]),
  'sky-blocked': losing('skyBlocked'),
  'corrections-stopped': losing('correctionsStopped'),
  'mount-point-down': losing('mountPointDown'),
  'far-from-base': losing('farFromBase'),
  'not-resolving': losing('notResolving'),
  'no-position': losing('noPosition'),
  'went-quiet': losing('wentQuiet'),
  'not-heard': losing('notHeard'),
  'never-corrected': losing('neverCorrected'),
  'bad-day': ofDay('bad-day'),
  'good-day': ofDay('good-day'),
  demo,
} satisfies Record<string, Scenario>;

export type ScenarioName = keyof typeof scenarios;
export const scenarioNames = Object.keys(scenarios) as [ScenarioName, ...ScenarioName[]];
