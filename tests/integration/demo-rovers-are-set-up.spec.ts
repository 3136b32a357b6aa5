import { againReasonOf } from '@hubtack/backend/set-up/shot-validity.js';
import { localDayOf } from '@hubtack/backend/common/local-day.js';
import { spansOf } from '@hubtack/backend/fixes/timeline.js';
import { RoverBadgesRepository } from '@hubtack/backend/set-up/rover-badges.repository.js';
import { enuOf } from '@hubtack/contracts/geodesy/enu.js';
import { checkShotResult } from '@hubtack/contracts/set-up/check-shot.js';
import { doubtsOf } from '@hubtack/contracts/set-up/doubts.js';
import { checkShots } from '@hubtack/drizzle/schema/check-shots.js';
import { controlPoints } from '@hubtack/drizzle/schema/control-points.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { roverAssignments } from '@hubtack/drizzle/schema/rovers.js';
import { setUpCards } from '@hubtack/drizzle/schema/set-up-cards.js';
import { spans } from '@hubtack/drizzle/schema/spans.js';
import { demoFirm } from '@hubtack/drizzle/seeds/demo-data.js';
import { seedDemoFirm } from '@hubtack/drizzle/seeds/demo-firm.js';
import { makeTestDatabase } from '@hubtack/drizzle/testing/test-database.js';
import { asc, eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';

const ZONE = demoFirm.timeZone;
const LOST_MS = 600_000;

/** The demo firm as it is begun at an instant. */
function begun(at: string) {
  const now = Date.parse(at);
  const { database, remove } = makeTestDatabase();
  seedDemoFirm(database, {
    now,
    passwordHash: 'none',
    casterPort: 2101,
    sealPassword: () => 'sealed',
    toSpans: spansOf,
  });
  const dayStart = localDayOf(now, ZONE).start;
  const badges = new RoverBadgesRepository(database).newest(dayStart, dayStart - 86_400_000);
  const crewsByName = database
    .select({ name: crews.name, roverId: roverAssignments.roverId })
    .from(crews)
    .innerJoin(roverAssignments, eq(roverAssignments.crewId, crews.id))
    .all();
  const badgeOf = (name: string) => {
    const { roverId } = crewsByName.find((crew) => crew.name === name)!;
    const badge = badges.get(roverId) ?? { card: null, shot: null };
    const heard = database
      .select()
      .from(spans)
      .where(eq(spans.roverId, roverId))
      .orderBy(asc(spans.start))
      .all();
    const mountPoint = badge.shot?.mountPoint ?? null;
    const rover = { now, dayStart, stationId: 1, mountPoint, card: badge.card, spans: heard };
    return { ...badge, again: badge.shot && againReasonOf(badge.shot, rover, LOST_MS) };
  };
  return { database, remove, badgeOf };
}

describe.each([
  ['of a working day', '2026-12-02T00:10:00Z'],
  ['just after midnight', '2026-12-01T13:10:00Z'],
  ['on a Sunday', '2026-12-06T03:00:00Z'],
])('the demo begun in the middle %s', (_when, at) => {
  it('has one rover checked, one to be checked again, and some without a card', () => {
    const { badgeOf, remove } = begun(at);
    const alder = badgeOf('Alder');
    expect(Math.round(alder.shot!.horizontalM * 1000)).toBe(9);
    expect(alder).toMatchObject({ card: { by: 'Crew chief Alder' }, shot: { passed: true }, again: null });
    expect(badgeOf('Currawong')).toMatchObject({ card: { poleHeightM: 2 }, again: 'cardChanged' });
    for (const name of ['Banksia', 'Dogwood'])
      expect(badgeOf(name)).toMatchObject({ card: expect.anything(), shot: null });
    for (const name of ['Echidna', 'Fernwren'])
      expect(badgeOf(name)).toMatchObject({ card: null, shot: null });
    remove();
  });
});

it('what the demo says was measured is so, and nobody was asked about what was not doubtful', () => {
  const { database, remove } = begun('2026-12-02T00:10:00Z');
  for (const { result, controlPointId } of database.select().from(checkShots).all()) {
    const { difference, latitude, longitude, heightM } = checkShotResult.parse(result);
    const point = database.select().from(controlPoints).where(eq(controlPoints.id, controlPointId)).get()!;
    const found = enuOf({ latitude, longitude, heightM: heightM! }, { ...point, heightM: point.height! });
    for (const key of ['eastM', 'northM', 'upM'] as const)
      expect(found[key]).toBeCloseTo(difference[key]!, 4);
  }
  const cards = database.select().from(setUpCards).orderBy(asc(setUpCards.at), asc(setUpCards.id)).all();
  for (const card of cards) {
    const before = cards.findLast((other) => other.roverId === card.roverId && other.id < card.id) ?? null;
    expect(card.confirmed).toEqual(doubtsOf(card, before));
  }
  remove();
});
