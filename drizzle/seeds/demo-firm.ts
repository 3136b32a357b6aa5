import { DateTime } from 'luxon';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import { uniformInt } from 'pure-rand/distribution/uniformInt';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { eq } from 'drizzle-orm';
import type { HubtackDatabase } from '../database.js';
import { correctionSources } from '../schema/correction-sources.js';
import { crews } from '../schema/crews.js';
import { firmSettings } from '../schema/firm-settings.js';
import { roverAssignments, rovers } from '../schema/rovers.js';
import { shiftPauses, shifts } from '../schema/shifts.js';
import { sites } from '../schema/sites.js';
import { spans } from '../schema/spans.js';
import { subscriptions } from '../schema/subscriptions.js';
import { toleranceSpans } from '../schema/tolerance-spans.js';
import { users } from '../schema/users.js';
import { DEMO_CASTER_PASSWORD, DEMO_CASTER_USER, DEMO_MAIL_DOMAIN } from './demo-accounts.js';
import {
  demoCrews,
  demoFirm,
  demoPattern,
  demoSites,
  demoSources,
  demoSpares,
  type DemoCrew,
} from './demo-data.js';
import { epochsOfShift, type TimedQuality } from './demo-past.js';
import { seedSetUp, type DemoRover } from './demo-set-up.js';

export interface DemoSpan {
  state: 'fixed' | 'float' | 'code' | 'none';
  start: number;
  end: number;
}

export interface DemoSeed {
  /** The instant the demo starts, ms UTC. */
  now: number;
  passwordHash: string;
  /** Port of the demo's own caster. */
  casterPort: number;
  /** Seals the password of a correction source, by its id. */
  sealPassword: (sourceId: number, password: string) => string;
  /** The product's own timeline: the past is what it makes of generated epochs, not invented totals. */
  toSpans: (epochs: readonly TimedQuality[]) => DemoSpan[];
}

const WEEKS = 12;
const SEED = 20_261_201;
/** Today's shift began this long before the demo, so that the board is full at whatever hour it is started. */
const TODAY_BEGAN_MS = 2 * 3_600_000;
const MINUTE = 60_000;
/** Invented: no raw epochs of the past are stored that would tell when a fix was within tolerance. */
const WITHIN_AFTER_MS = 40_000;

/** Fills an empty database with the demo firm and twelve past weeks. One transaction: all of it or nothing. */
export function seedDemoFirm(database: HubtackDatabase, seed: DemoSeed): void {
  const random = xoroshiro128plus(SEED);
  database.transaction((tx) => {
    tx.insert(firmSettings)
      .values({ id: 1, ...demoFirm })
      .run();
    const siteIds = new Map(
      demoSites.map((site) => [site.name, tx.insert(sites).values(site).returning().get().id] as const),
    );
    const sourceIds = new Map(
      demoSources.map((source) => {
        const row = {
          ...source,
          address: 'localhost',
          port: seed.casterPort,
          user: DEMO_CASTER_USER,
          sendPosition: source.mountPoint === 'TASNET',
        };
        const { id } = tx.insert(correctionSources).values(row).returning().get();
        tx.update(correctionSources)
          .set({ sealedPassword: seed.sealPassword(id, DEMO_CASTER_PASSWORD) })
          .where(eq(correctionSources.id, id))
          .run();
        return [source.mountPoint, id] as const;
      }),
    );
    const createdAt = seed.now - WEEKS * 7 * 86_400_000;
    const addUser = (
      name: string,
      local: string,
      role: typeof users.$inferInsert.role,
      crewId: number | null,
    ) =>
      tx
        .insert(users)
        .values({
          name,
          email: `${local}@${DEMO_MAIL_DOMAIN}`,
          passwordHash: seed.passwordHash,
          role,
          crewId,
          createdAt,
        })
        .run();
    addUser('Manager', 'manager', 'manager', null);
    tx.insert(subscriptions).values({ userId: 1, sheet: 'weekly' }).run();
    addUser('Dispatcher', 'dispatcher', 'dispatcher', null);
    addUser('Technician', 'technician', 'technician', null);
    const receiver = 'dual-frequency receiver';
    const setUp: DemoRover[] = [];
    for (const crew of demoCrews) {
      const { name, phone, hourlyRate } = crew;
      const crewId = tx
        .insert(crews)
        .values({ name, phone, hourlyRate, siteId: siteIds.get(crew.site)!, pattern: demoPattern })
        .returning()
        .get().id;
      addUser(`Crew chief ${name}`, `chief.${name.toLowerCase()}`, 'crewChief', crewId);
      const roverIds = crew.rovers.map(({ label, mountPoint }) => {
        const row = {
          label,
          receiver,
          serial: `PW-${label.slice(2)}`,
          correctionSourceId: sourceIds.get(mountPoint)!,
        };
        const roverId = tx.insert(rovers).values(row).returning().get().id;
        tx.insert(roverAssignments).values({ roverId, crewId, startAt: createdAt }).run();
        return roverId;
      });
      const list = shiftsOf(random, seed.now);
      for (const shift of list) {
        const shiftId = tx
          .insert(shifts)
          .values({ crewId, startAt: shift.start, endAt: shift.open ? null : shift.end })
          .returning()
          .get().id;
        for (const pause of shift.pauses)
          tx.insert(shiftPauses)
            .values({ shiftId, startAt: pause.start, endAt: pause.end, reason: 'lunch' })
            .run();
        for (const roverId of roverIds) {
          const rows = spansOfShift(random, crew, shift, seed.toSpans).map((span) => ({ roverId, ...span }));
          if (shift.open)
            setUp.push({
              crewName: name,
              crewId,
              roverId,
              mountPoint: crew.rovers[roverIds.indexOf(roverId)]!.mountPoint,
              lastShiftAt: list.at(-2)!.start,
              shiftAt: shift.start,
              spans: rows,
            });
          if (rows.length === 0) continue;
          tx.insert(spans).values(rows).run();
          const within = rows.filter(
            ({ state, start: at, end }) => state === 'fixed' && end - at > WITHIN_AFTER_MS,
          );
          for (const { start: at, end } of within)
            tx.insert(toleranceSpans)
              .values({ roverId, start: at + WITHIN_AFTER_MS, end })
              .run();
        }
      }
    }
    seedSetUp(tx, setUp, sourceIds, seed.now);
    for (const label of demoSpares)
      tx.insert(rovers)
        .values({ label, receiver, serial: `PW-${label.slice(2)}` })
        .run();
  });
}

interface DemoShift {
  start: number;
  end: number;
  open: boolean;
  pauses: { start: number; end: number }[];
}

/** Working days of the past weeks, in the firm's zone, and today's open shift. */
function shiftsOf(random: RandomGenerator, now: number): DemoShift[] {
  const today = DateTime.fromMillis(now, { zone: demoFirm.timeZone }).startOf('day');
  const past: DemoShift[] = [];
  for (let back = WEEKS * 7; back > 0; back--) {
    const day = today.minus({ days: back });
    if (day.weekday > 5) continue;
    const start = day.set({ hour: 7 }).toMillis() + uniformInt(random, -5, 15) * MINUTE;
    const end = day.set({ hour: 15, minute: 30 }).toMillis() + uniformInt(random, -20, 25) * MINUTE;
    const lunch = day.set({ hour: 12 }).toMillis() + uniformInt(random, -10, 10) * MINUTE;
    past.push({ start, end, open: false, pauses: [{ start: lunch, end: lunch + 30 * MINUTE }] });
  }
  const start = now - TODAY_BEGAN_MS;
  // The simulated fleet goes on from here within seconds.
  return [...past, { start, end: now, open: true, pauses: [] }];
}

function spansOfShift(
  random: RandomGenerator,
  crew: DemoCrew,
  shift: DemoShift,
  toSpans: DemoSeed['toSpans'],
): DemoSpan[] {
  // The mistyped mount point of today: no corrections since power-up, so a code position all along.
  const neverCorrected = shift.open && crew.rovers.some(({ mountPoint }) => mountPoint === 'TANF0O');
  const epochs = epochsOfShift(random, shift.start, shift.end, shift.open ? crew.trouble / 2 : crew.trouble);
  const heard = epochs.filter(
    ({ time }) => !shift.pauses.some(({ start, end }) => time >= start && time < end),
  );
  return toSpans(neverCorrected ? heard.map(({ time }) => ({ time, quality: 1 })) : heard);
}
