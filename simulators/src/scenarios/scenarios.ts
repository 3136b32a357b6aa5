import {
  correctionsStopped,
  neverCorrected,
  quiet,
  steady,
  trees,
  unrest,
  type Behaviour,
} from './behaviour.js';

/** Behaviours of the n-th crew of a fleet. */
export type Scenario = (crew: number) => Behaviour[];

const YEAR = 366 * 86_400;

/** Something happens within the first minute: one under trees, one without corrections, one quiet, one never fixed. */
const demo: Scenario = (crew) => {
  const rounds = Array.from({ length: 200 }, (_, round) => round * 420);
  switch (crew % 6) {
    case 3:
      return [steady(4), ...rounds.map((at) => trees(at + 25, 150))];
    case 1:
      return [steady(4), ...rounds.map((at) => correctionsStopped(at + 35, 120))];
    case 4:
      return [steady(4), quiet(30, YEAR)];
    case 5:
      return [steady(4), neverCorrected()];
    default:
      return [steady(4), unrest(900)];
  }
};

export const scenarios = {
  steady: () => [steady()],
  unrest: () => [steady(), unrest(300)],
  trees: (crew) => [steady(), trees(60 + crew * 7, 120)],
  'corrections-stopped': (crew) => [steady(), correctionsStopped(60 + crew * 7, 120)],
  quiet: (crew) => [steady(), quiet(60 + crew * 7, 120)],
  'never-fixed': () => [steady(), neverCorrected()],
  demo,
} satisfies Record<string, Scenario>;

export type ScenarioName = keyof typeof scenarios;
export const scenarioNames = Object.keys(scenarios) as [ScenarioName, ...ScenarioName[]];
