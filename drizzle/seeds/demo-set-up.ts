import { DateTime } from 'luxon';
import type { CheckShotResult } from '@hubtack/contracts/set-up/check-shot.js';
import { antennaAboveGroundM } from '@hubtack/contracts/set-up/pole.js';
import type { HubtackDatabase } from '../database.js';
import { checkShots } from '../schema/check-shots.js';
import { controlPoints } from '../schema/control-points.js';
import { setUpCards } from '../schema/set-up-cards.js';
import { demoFirm } from './demo-data.js';

type Card = typeof setUpCards.$inferInsert;
type Shown = Pick<Card, 'poleHeightM' | 'measuringPoint' | 'antennaOffsetM' | 'tilt'> &
  Partial<Pick<Card, 'confirmed' | 'note'>>;

/** What the seed knows of a crew's rover when its days have been made. */
export interface DemoRover {
  crewName: string;
  crewId: number;
  roverId: number;
  mountPoint: string;
  /** Starts of the shift before today's, and of today's. */
  lastShiftAt: number;
  shiftAt: number;
  /** Today's spans. */
  spans: readonly { state: string; start: number; end: number }[];
}

const MINUTE = 60_000;
/** After a longer loss a check shot counts no more (the firm's setting, as it comes). */
const LONG_LOSS_MS = 10 * MINUTE;
/** What every simulated rover says of its base. */
const STATION_ID = 1;
const METRES_A_DEGREE = 111_320;

/** Marks of two sites, invented. QB1 is where the simulated rover of Quarry Bend stands: its antenna, 42 m above the geoid, is 1.893 m over it. */
const datum = 'GDA2020, heights AHD';
const demoControlPoints = [
  { name: 'TF1', latitude: -41.41861, longitude: 147.10248, height: 40.118, note: 'Nail in kerb, gate 2' },
  { name: 'TF2', latitude: -41.41942, longitude: 147.10139, height: 38.462, note: 'Star picket, creek side' },
  { name: 'QB1', latitude: -41.3527, longitude: 147.2318, height: 40.107, note: 'Brass plaque, weighbridge' },
  { name: 'QB2', latitude: -41.35343, longitude: 147.23092, height: 46.905, note: 'Drill hole, upper bench' },
].map((point) => ({ ...point, heightKind: 'geoid' as const, datum }));

const usual: Shown = {
  poleHeightM: 1.8,
  measuringPoint: 'mountBottom',
  antennaOffsetM: 0.093,
  tilt: 'calibrated',
};
const upright: Shown = { ...usual, poleHeightM: 2, tilt: 'off' };
const toPhaseCentre: Shown = {
  ...usual,
  poleHeightM: 1.893,
  measuringPoint: 'phaseCentre',
  antennaOffsetM: 0,
};

interface Story {
  before: Shown;
  /** Cards of today, with minutes after the shift began. */
  today: [number, Shown][];
  shot?: { point: string; eastM: number; northM: number; upM: number };
}

/**
 * Alder is as it should be. Currawong's pole grew on a card after its check, and not in fact: the next check shot on QB1 says so.
 * Echidna and Fernwren have no card of today.
 */
const stories: Record<string, Story> = {
  Alder: {
    before: usual,
    today: [[4, usual]],
    shot: { point: 'TF1', eastM: 0.007, northM: -0.006, upM: 0.011 },
  },
  Banksia: { before: upright, today: [[9, upright]] },
  Currawong: {
    before: usual,
    today: [
      [6, usual],
      [
        95,
        { ...usual, poleHeightM: 2, confirmed: ['eighteenAgainstTwenty'], note: 'Pole out for the batter' },
      ],
    ],
    shot: { point: 'QB1', eastM: -0.004, northM: 0.012, upM: -0.017 },
  },
  Dogwood: { before: toPhaseCentre, today: [[14, toPhaseCentre]] },
  Echidna: { before: upright, today: [] },
  Fernwren: { before: usual, today: [] },
};

/** Control points, set-up cards of today and of the shift before, check shots: invented. `sourceIds` by mount point. */
export function seedSetUp(
  database: Pick<HubtackDatabase, 'insert'>,
  list: readonly DemoRover[],
  sourceIds: ReadonlyMap<string, number>,
  now: number,
): void {
  const points = new Map(
    demoControlPoints.map((point) => [
      point.name,
      database.insert(controlPoints).values(point).returning().get(),
    ]),
  );
  const dayStart = DateTime.fromMillis(now, { zone: demoFirm.timeZone }).startOf('day').toMillis();
  /** Nothing of today before midnight, or after now: the demo may be started at any hour. */
  const today = (at: number) => Math.min(Math.max(at, dayStart), now - MINUTE);
  for (const rover of list) {
    const story = stories[rover.crewName];
    if (!story) continue;
    const add = (at: number, shown: Shown, mountPoint: string) =>
      database
        .insert(setUpCards)
        .values(cardOf(rover, at, shown, sourceIds.get(mountPoint)!))
        .returning()
        .get();
    // What is mistyped today was right before.
    add(rover.lastShiftAt + 5 * MINUTE, story.before, rover.mountPoint.replace('F0O', 'F00'));
    const [first] = story.today.map(([minutes, shown]) =>
      add(today(rover.shiftAt + minutes * MINUTE), shown, rover.mountPoint),
    );
    if (!story.shot || !first) continue;
    const point = points.get(story.shot.point)!;
    const at = Math.max(today(lastLongLossEnd(rover) + 10 * MINUTE), first.at);
    const result = resultOf(story.shot, point, antennaAboveGroundM(first), at);
    const { roverId, crewId, mountPoint } = rover;
    const { id: controlPointId, name: controlPointName } = point;
    const of = { roverId, crewId, controlPointId, controlPointName, datum, setUpCardId: first.id };
    const seen = { stationId: STATION_ID, mountPoint, passed: true, result, note: null };
    database
      .insert(checkShots)
      .values({ ...of, at, by: first.by, ...seen })
      .run();
  }
}

function cardOf({ roverId, crewId, crewName }: DemoRover, at: number, shown: Shown, sourceId: number): Card {
  const by = `Crew chief ${crewName}`;
  return {
    ...shown,
    roverId,
    crewId,
    at,
    by,
    correctionSourceId: sourceId,
    messageFormat: 'msm',
    toleranceProfile: 'topographic',
    checkedBy: by,
    note: shown.note ?? null,
    confirmed: shown.confirmed ?? [],
  };
}

/** End of the last stretch of today without a fix that a check shot does not outlive; the start of the shift without one. */
function lastLongLossEnd({ spans, shiftAt }: DemoRover): number {
  let end = shiftAt;
  let fixedUntil = shiftAt;
  for (const span of spans.filter(({ state }) => state === 'fixed')) {
    if (span.start - fixedUntil > LONG_LOSS_MS) end = span.start;
    fixedUntil = span.end;
  }
  return end;
}

function resultOf(
  { eastM, northM, upM }: { eastM: number; northM: number; upM: number },
  point: { latitude: number; longitude: number; height: number | null },
  poleHeightM: number,
  at: number,
): CheckShotResult {
  const shrink = Math.cos((point.latitude * Math.PI) / 180);
  return {
    epochs: 30,
    firstAt: new Date(at - 31_000).toISOString(),
    lastAt: new Date(at - 2000).toISOString(),
    latitude: point.latitude + northM / METRES_A_DEGREE,
    longitude: point.longitude + eastM / (METRES_A_DEGREE * shrink),
    heightM: point.height! + upM,
    poleHeightM,
    difference: { eastM, northM, upM },
    scatter: { eastM: 0.004, northM: 0.005, upM: 0.009 },
    horizontalM: Math.hypot(eastM, northM),
    horizontalLimitM: 0.03,
    verticalLimitM: 0.05,
    passed: true,
    warnings: [`Nothing is transformed: the rover must give positions in ${datum}.`],
  };
}
