import { Inject, Injectable } from '@nestjs/common';
import { fixStateOfQuality } from '@hubtack/contracts/fixes/fix-state.js';
import { doubtFields, doubtsOf, doubtWords } from '@hubtack/contracts/set-up/doubts.js';
import { groundHeight } from '@hubtack/contracts/set-up/pole.js';
import type {
  Ground,
  GroundQuery,
  SetUpCard,
  SetUpCardBody,
  SetUpStart,
} from '@hubtack/contracts/set-up/set-up-card.js';
import { profileOf } from '@hubtack/contracts/weekly/tolerance-profile.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { correctionSources } from '@hubtack/drizzle/schema/correction-sources.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { rovers } from '@hubtack/drizzle/schema/rovers.js';
import { asc, eq } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { notFound, ProblemException } from '../common/problem.exception.js';
import { tapTime } from '../common/tap-time.js';
import { DATABASE } from '../database/database.module.js';
import { FixesService } from '../fixes/fixes.service.js';
import { RoverAccessService } from '../fixes/rover-access.service.js';
import { SettingsService } from '../settings/settings.service.js';
import { SetUpCardsRepository } from './set-up-cards.repository.js';

/** How rovers were set up, as somebody vouched for it. */
@Injectable()
export class SetUpCardsService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly cards: SetUpCardsRepository,
    private readonly access: RoverAccessService,
    private readonly fixes: FixesService,
    private readonly settings: SettingsService,
    private readonly audit: AuditService,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  /** Newest first; a crew chief sees those since the rover came to the crew. */
  list(viewer: Viewer, roverId: number): SetUpCard[] {
    return this.cards.ofRover(roverId, this.access.visibleFrom(viewer, roverId));
  }

  get(viewer: Viewer, id: number): SetUpCard {
    const card = this.cards.get(id);
    if (!card || Date.parse(card.at) < this.access.visibleFrom(viewer, card.roverId))
      throw notFound('This set-up card');
    return card;
  }

  start(viewer: Viewer, roverId: number): SetUpStart {
    this.access.visibleFrom(viewer, roverId);
    const rover = this.database.select().from(rovers).where(eq(rovers.id, roverId)).get()!;
    const settings = this.settings.get();
    return {
      // Also of the crew before: the pole goes with the rover.
      card: this.cards.ofRover(roverId, 0, 1)[0] ?? null,
      choices: this.database
        .select({
          id: correctionSources.id,
          name: correctionSources.name,
          mountPoint: correctionSources.mountPoint,
        })
        .from(correctionSources)
        .orderBy(asc(correctionSources.name))
        .all(),
      correctionSourceId: rover.correctionSourceId,
      toleranceProfile: profileOf(settings, this.profileNameOf(roverId)).name,
      profiles: [settings.toleranceProfile, ...settings.otherProfiles].map(({ name }) => name),
    };
  }

  /** Of the crew that has it now. */
  private profileNameOf(roverId: number): string | null {
    const crewId = this.cards.crewAt(roverId, this.clock.now());
    if (crewId === null) return null;
    return this.database.select().from(crews).where(eq(crews.id, crewId)).get()?.toleranceProfile ?? null;
  }

  ground(viewer: Viewer, { roverId, ...pole }: GroundQuery): Ground {
    this.access.visibleFrom(viewer, roverId);
    const latest = this.fixes.latest(roverId);
    if (!latest) return { at: null, state: 'silent', aboveGeoidM: null, aboveEllipsoidM: null };
    const isHeld = (this.fixes.heldUntil(roverId) ?? 0) > this.clock.now();
    const state = fixStateOfQuality(latest.quality);
    // What a receiver writes without a position is filler, not a height.
    const altitudeM = state === 'none' ? null : latest.altitudeM;
    return {
      at: new Date(latest.time).toISOString(),
      state: isHeld ? state : 'silent',
      ...groundHeight({ ...latest, altitudeM }, pole),
    };
  }

  /** Runs inside the transaction of the tap. The newest card also says what the rover takes its corrections from. */
  add(viewer: Viewer, body: SetUpCardBody): SetUpCard {
    const { roverId } = body;
    this.access.visibleFrom(viewer, roverId);
    const now = this.clock.now();
    const at = tapTime(body.at, now);
    const source = this.sourceOf(body.correctionSourceId);
    const before = this.cards.newest(roverId, 0, at) ?? null;
    this.refuseDoubtful(body, before);
    const { confirmed, at: _at, ...values } = body;
    const asked = doubtsOf(body, before);
    const id = this.cards.insert({
      ...values,
      at,
      by: viewer.name,
      crewId: this.cards.crewAt(roverId, at),
      confirmed: confirmed.filter((doubt) => asked.includes(doubt)),
    });
    const card = this.cards.get(id)!;
    this.audit.record(viewer, { action: 'setUpCard.added', subject: card.roverLabel, after: { ...card } });
    const isNewest = this.cards.newest(roverId, 0, now)?.id === id;
    if (isNewest && source !== null) this.moveRover(viewer, card, source);
    this.changes.announce({ kind: 'firm' });
    return card;
  }

  private sourceOf(id: number | null): number | null {
    if (id === null) return null;
    const row = this.database.select().from(correctionSources).where(eq(correctionSources.id, id)).get();
    if (row) return id;
    const detail = 'There is no such correction source.';
    throw new ProblemException(400, 'invalidBody', detail, {
      errors: [{ pointer: '/correctionSourceId', detail }],
    });
  }

  private refuseDoubtful(body: SetUpCardBody, before: SetUpCard | null): void {
    const open = doubtsOf(body, before).filter((doubt) => !body.confirmed.includes(doubt));
    if (open.length === 0) return;
    const errors = open.map((doubt) => ({
      pointer: `/${doubtFields[doubt]}`,
      detail: doubtWords(doubt, body, before),
    }));
    throw new ProblemException(
      409,
      'needsConfirmation',
      'Look again, and confirm what is right as it stands.',
      { errors },
    );
  }

  /** The office sees the mount point that the crew really uses. */
  private moveRover(viewer: Viewer, { roverId, roverLabel }: SetUpCard, correctionSourceId: number): void {
    const before = this.database.select().from(rovers).where(eq(rovers.id, roverId)).get()!;
    if (before.correctionSourceId === correctionSourceId) return;
    this.database.update(rovers).set({ correctionSourceId }).where(eq(rovers.id, roverId)).run();
    this.audit.record(viewer, {
      action: 'rover.changed',
      subject: roverLabel,
      before: { correctionSourceId: before.correctionSourceId },
      after: { correctionSourceId },
    });
  }
}
