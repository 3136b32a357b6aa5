import { Inject, Injectable } from '@nestjs/common';
import type { ControlPoint } from '@hubtack/contracts/control-points/control-point.js';
import type { CheckShot, CheckShotBody, CheckShotResult } from '@hubtack/contracts/set-up/check-shot.js';
import type { SetUpCard } from '@hubtack/contracts/set-up/set-up-card.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { controlPoints } from '@hubtack/drizzle/schema/control-points.js';
import { and, eq } from 'drizzle-orm';
import { DateTime } from 'luxon';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { localDayOf } from '../common/local-day.js';
import { notFound, ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import type { Epoch } from '../fixes/epoch.js';
import { FixesService } from '../fixes/fixes.service.js';
import { RoverAccessService } from '../fixes/rover-access.service.js';
import { RosterRepository } from '../rovers/roster.repository.js';
import { SettingsService } from '../settings/settings.service.js';
import { CheckShotsRepository } from './check-shots.repository.js';
import { epochWarnings } from './epoch-warnings.js';
import { meanPosition } from './mean-position.js';
import { SetUpCardsRepository } from './set-up-cards.repository.js';
import { groundOfMean, groundOfTyped, shotResult } from './shot-result.js';

/** The newest fixed epochs are looked for this far back: what is older was another place. */
const LOOKED_BACK_MS = 15 * 60_000;
/** A receiver's clock may be a little ahead. */
const AHEAD_MS = 60_000;
/** Farther from the control point is another one, or another datum. */
const FARTHEST_M = 10;
const FIXED = 4;

interface Taken {
  result: CheckShotResult;
  card: SetUpCard | null;
  stationId: number | null;
}

/** Checks into control: what a rover makes of a mark whose position is known. */
@Injectable()
export class CheckShotsService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly shots: CheckShotsRepository,
    private readonly cards: SetUpCardsRepository,
    private readonly access: RoverAccessService,
    private readonly roster: RosterRepository,
    private readonly fixes: FixesService,
    private readonly settings: SettingsService,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  /** A crew chief sees the own crew's; `date` is a local day. */
  list(
    viewer: Viewer,
    { roverId, date }: { roverId?: number | undefined; date?: string | undefined },
  ): CheckShot[] {
    const from = roverId === undefined ? undefined : this.access.visibleFrom(viewer, roverId);
    const zone = this.settings.get().timeZone;
    const day = date === undefined ? null : localDayOf(DateTime.fromISO(date, { zone }).toMillis(), zone);
    const isChief = viewer.role === 'crewChief';
    if (isChief && viewer.crewId === null) return [];
    return this.shots.list({
      roverId,
      crewId: isChief ? viewer.crewId! : undefined,
      from: day ? Math.max(day.start, from ?? 0) : from,
      to: day?.end,
    });
  }

  get(viewer: Viewer, id: number): CheckShot {
    const shot = this.shots.get(id);
    const isForeign = viewer.role === 'crewChief' && shot?.crewId !== viewer.crewId;
    if (!shot || isForeign) throw notFound('This check shot');
    return shot;
  }

  preview(viewer: Viewer, body: CheckShotBody): CheckShotResult {
    return this.take(viewer, body, this.pointOf(body)).result;
  }

  add(viewer: Viewer, body: CheckShotBody): CheckShot {
    const point = this.pointOf(body);
    const { result, card, stationId } = this.take(viewer, body, point);
    const { roverId, note } = body;
    const at = this.clock.now();
    const id = this.shots.insert({
      roverId,
      crewId: this.cards.crewAt(roverId, at),
      controlPointId: point.id,
      controlPointName: point.name,
      datum: point.datum,
      setUpCardId: card?.id ?? null,
      at,
      by: viewer.name,
      stationId,
      mountPoint: this.roster.mountPointOf(roverId),
      passed: result.passed,
      result,
      note,
    });
    this.changes.announce({ kind: 'firm' });
    return this.shots.get(id)!;
  }

  private pointOf({ controlPointId }: CheckShotBody): ControlPoint {
    const point = this.database
      .select()
      .from(controlPoints)
      .where(and(eq(controlPoints.id, controlPointId), eq(controlPoints.active, true)))
      .get();
    if (!point) throw notFound('This control point');
    return point;
  }

  private take(viewer: Viewer, { roverId, measure }: CheckShotBody, point: ControlPoint): Taken {
    this.access.visibleFrom(viewer, roverId);
    const now = this.clock.now();
    const { timeZone: zone, checkShotLimits, toleranceProfile } = this.settings.get();
    const card = this.cards.newest(roverId, localDayOf(now, zone).start, now) ?? null;
    const epochs = measure.from === 'epochs' ? this.newestFixed(roverId, measure.epochs, now) : [];
    const mean = meanPosition(epochs);
    const ground =
      measure.from === 'typed' ? groundOfTyped(measure, point) : groundOfMean(mean!, card, point);
    const result = shotResult(ground, mean, card, point, checkShotLimits);
    if (mean) {
      const maxAgeMs = toleranceProfile.maxAgeSeconds * 1000;
      result.warnings.push(...epochWarnings(epochs, mean.scatter, { now, maxAgeMs }));
    }
    if (result.horizontalM > FARTHEST_M) {
      const metres = Math.round(result.horizontalM);
      const far = metres < 10_000 ? `${metres} m` : `${Math.round(metres / 1000)} km`;
      throw bad(
        '/controlPointId',
        `That is ${far} from ${point.name}: is it this control point, and this datum?`,
      );
    }
    if (point.datum !== null)
      result.warnings.push(`Nothing is transformed: the rover must give positions in ${point.datum}.`);
    const newest = epochs.at(-1) ?? this.fixes.latest(roverId);
    return { result, card, stationId: newest?.stationId ?? null };
  }

  private newestFixed(roverId: number, wanted: number, now: number): Epoch[] {
    const fixed = this.fixes
      .epochs(roverId, now - LOOKED_BACK_MS, now + AHEAD_MS)
      .filter(
        ({ quality, latitude, longitude }) => quality === FIXED && latitude !== null && longitude !== null,
      );
    if (fixed.length < wanted)
      throw bad(
        '/measure/epochs',
        `There are ${fixed.length} fixed positions of the last quarter of an hour, and ${wanted} are asked for.`,
      );
    return fixed.slice(-wanted);
  }
}

const bad = (pointer: string, detail: string) =>
  new ProblemException(400, 'invalidBody', detail, { errors: [{ pointer, detail }] });
