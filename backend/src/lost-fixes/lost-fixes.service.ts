import { Inject, Injectable } from '@nestjs/common';
import type {
  CloseBody,
  FlagBody,
  LostFix,
  LostFixDetail,
  LostFixList,
  LostFixQuery,
  ShelveBody,
} from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { flagLabels } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { causeLabels } from '@hubtack/contracts/lost-fixes/cause.js';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { and, asc, eq, ne } from 'drizzle-orm';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { conflict, notFound, ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import { RosterRepository } from '../rovers/roster.repository.js';
import { LostFixAccess } from './lost-fix.access.js';
import { LostFixRepository, type LostFixChange } from './lost-fix.repository.js';
import { forChief, lostFixOf, saysLooksWrong, type LostFixRow } from './lost-fix.view.js';
import { LostFixWatch } from './lost-fix.watch.js';
import { LostFixWriter } from './lost-fix.writer.js';
import { NearMountPoints } from './near-mount-points.js';
import { tapTime } from '../common/tap-time.js';

const PAGE = 100;
/** Everything that is not closed comes at once. */
const MOST_ACTIVE = 1000;
/** A flag of a moment before or after belongs to the loss. */
const FLAG_SLACK_MS = 5 * 60_000;

/** What people do about lost fixes. */
@Injectable()
export class LostFixesService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly changes: Changes,
    private readonly clock: Clock,
    private readonly lostFixes: LostFixRepository,
    private readonly access: LostFixAccess,
    private readonly writer: LostFixWriter,
    private readonly watch: LostFixWatch,
    private readonly roster: RosterRepository,
    private readonly near: NearMountPoints,
  ) {}

  /** Those that have not ended and are not closed. */
  openIds(): number[] {
    return this.lostFixes.openRows().map(({ id }) => id);
  }

  /** As they stand, with the crews that may see each: the own one, or all that hang under a mount point's. */
  withCrews(ids: readonly number[]): { lostFix: LostFix; crewIds: number[] }[] {
    return this.lostFixes.records(ids).map((record) => {
      const lostFix = lostFixOf(record);
      const own = lostFix.crewId === null ? [] : [lostFix.crewId];
      const ofMembers =
        lostFix.kind === 'mountPoint' ? this.lostFixes.members(lostFix.id).map(({ crewId }) => crewId) : [];
      return { lostFix, crewIds: [...own, ...ofMembers.filter((crewId) => crewId !== null)] };
    });
  }

  list(viewer: Viewer, query: LostFixQuery): LostFixList {
    const asked = viewer.role === 'crewChief' ? { ...query, crewId: viewer.crewId ?? undefined } : query;
    if (viewer.role === 'crewChief' && viewer.crewId === null) return { lostFixes: [], nextBefore: null };
    const limit = query.status === 'active' ? MOST_ACTIVE : PAGE;
    const lostFixes = this.lostFixes.list(asked, limit).map(lostFixOf);
    const last = lostFixes.at(-1);
    return { lostFixes, nextBefore: last && lostFixes.length === limit ? last.id : null };
  }

  detail(viewer: Viewer, id: number): LostFixDetail {
    const row = this.access.visible(viewer, id);
    const [record] = this.lostFixes.records([id]);
    const isForeign = (crewId: number | null) => viewer.role === 'crewChief' && crewId !== viewer.crewId;
    return {
      ...(viewer.role === 'crewChief' ? forChief(lostFixOf(record!)) : lostFixOf(record!)),
      // Advice on the mount point's is advice for all that hang under it.
      history: this.lostFixes.history(row.sharedId === null ? [id] : [id, row.sharedId]),
      photoList: this.lostFixes.photos(id),
      memberList: this.lostFixes
        .memberRecords(id)
        .map(lostFixOf)
        .filter(({ crewId }) => !isForeign(crewId)),
      nearest: this.near.of(row),
    };
  }

  /** Who a lost fix can be handed to. */
  people(): { id: number; name: string }[] {
    return this.database
      .select({ id: users.id, name: users.name })
      .from(users)
      .where(and(eq(users.active, true), ne(users.role, 'crewChief')))
      .orderBy(asc(users.name))
      .all();
  }

  /** A chief says that something is wrong: about the loss that is there, or as one of its own. */
  flag(viewer: Viewer, body: FlagBody): LostFix {
    const now = this.clock.now();
    const at = tapTime(body.at, now);
    const entry = this.roster.list(now).find(({ roverId }) => roverId === body.roverId);
    const isOwn = viewer.role !== 'crewChief' || (entry?.crewId != null && entry.crewId === viewer.crewId);
    if (!entry || entry.crewId === null || !isOwn) throw notFound('This rover of the crew');
    const flag = {
      flagAt: at,
      flagWord: body.word,
      flagNote: body.note,
      flagBy: viewer.name,
    } satisfies LostFixChange;
    const known = this.knownAt(body, at);
    const id = this.database.transaction(() => {
      const { crewId, roverId, mountPoint } = entry;
      const flagged =
        known?.id ??
        this.lostFixes.insert({
          kind: 'flag',
          roverId,
          crewId,
          mountPoint,
          startAt: at,
          raisedAt: at,
          ...flag,
        });
      this.lostFixes.update(flagged, flag);
      const words = body.note ? `${flagLabels[body.word]}: ${body.note}` : flagLabels[body.word];
      this.lostFixes.addHistory(flagged, { at, by: viewer.name, kind: 'flagged', text: words });
      return flagged;
    });
    return this.told(id);
  }

  /** The lost fix that a flag is about; a fix that looks wrong is a matter of its own. */
  private knownAt({ roverId, word }: FlagBody, at: number): LostFixRow | undefined {
    return this.lostFixes
      .ofRover(roverId, at - DAY_MS, at + FLAG_SLACK_MS)
      .filter((row) => saysLooksWrong(row) === (word === 'fixLooksWrong'))
      .findLast(
        ({ closedAt, ending, startAt, endAt }) =>
          closedAt === null &&
          ending !== 'withdrawn' &&
          startAt <= at + FLAG_SLACK_MS &&
          (endAt === null || endAt >= at),
      );
  }

  /** The second to take it is told who has it. */
  take(viewer: Viewer, id: number): LostFix {
    return this.act(viewer, id, (row) => {
      if (row.takenByUserId !== null && row.takenByUserId !== viewer.userId)
        throw conflict(`${this.nameOf(row.takenByUserId)} has it.`);
      if (row.takenByUserId === null) this.give(viewer, row, viewer.userId!, 'taken', 'Taken');
    });
  }

  handOver(viewer: Viewer, id: number, userId: number): LostFix {
    return this.act(viewer, id, (row) => {
      const person = this.people().find((candidate) => candidate.id === userId);
      if (!person)
        throw new ProblemException(400, 'invalidBody', 'It can be handed to people of the office only.', {
          errors: [{ pointer: '/userId', detail: 'Nobody of the office' }],
        });
      this.give(viewer, row, userId, 'handedOver', `Handed over to ${person.name}`);
    });
  }

  advise(viewer: Viewer, id: number, text: string): LostFix {
    return this.act(viewer, id, (row) => {
      this.record(viewer, row.id, 'advice', text);
      if (row.takenByUserId === null && row.endAt === null)
        this.give(viewer, row, viewer.userId!, 'taken', 'Taken');
    });
  }

  shelve(viewer: Viewer, id: number, { minutes, reason }: ShelveBody): LostFix {
    const until = this.clock.now() + minutes * 60_000;
    return this.act(viewer, id, (row) => {
      this.lostFixes.update(row.id, { shelvedUntil: until, shelvedBy: viewer.name, shelfReason: reason });
      this.record(viewer, row.id, 'shelved', `Shelved for ${minutes} min: ${reason}`);
    });
  }

  unshelve(viewer: Viewer, id: number): LostFix {
    return this.act(viewer, id, (row) => {
      if (row.shelvedUntil === null) return;
      this.lostFixes.update(row.id, { shelvedUntil: null, shelvedBy: null, shelfReason: null });
      this.record(viewer, row.id, 'backFromShelf', 'Taken off the shelf');
    });
  }

  /** A person confirms the cause. Closing a mount point's closes what hangs under it and has been closed by nobody. */
  close(viewer: Viewer, id: number, body: CloseBody): LostFix {
    return this.act(viewer, id, (row) => {
      const members = this.lostFixes.members(row.id).filter(({ closedAt }) => closedAt === null);
      for (const one of [row, ...members]) this.closeOne(viewer, one, body);
    });
  }

  private closeOne(viewer: Viewer, row: LostFixRow, { cause, note }: CloseBody): void {
    const now = this.clock.now();
    // A flag that no loss came of has no other end.
    const isOver = row.kind === 'flag' && row.endAt === null;
    this.writer.change(row.id, {
      closedAt: now,
      closedBy: viewer.name,
      confirmedCause: cause,
      closingNote: note,
      ...(isOver ? { endAt: now, ending: 'person' as const } : {}),
    });
    this.record(viewer, row.id, 'closed', note ? `${causeLabels[cause]}: ${note}` : causeLabels[cause]);
  }

  private give(
    viewer: Viewer,
    row: LostFixRow,
    userId: number,
    kind: 'taken' | 'handedOver',
    text: string,
  ): void {
    this.lostFixes.update(row.id, { takenAt: this.clock.now(), takenByUserId: userId });
    this.record(viewer, row.id, kind, text);
  }

  private record(viewer: Viewer, id: number, kind: Parameters<LostFixWriter['note']>[1], text: string): void {
    this.lostFixes.addHistory(id, { at: this.clock.now(), by: viewer.name, kind, text });
  }

  private act(viewer: Viewer, id: number, effect: (row: LostFixRow) => void): LostFix {
    this.database.transaction(() => {
      const row = this.access.visible(viewer, id);
      if (row.closedAt !== null) throw conflict(`It was closed by ${row.closedBy}.`);
      effect(row);
    });
    return this.told(id);
  }

  private nameOf(userId: number): string {
    return this.people().find(({ id }) => id === userId)?.name ?? 'Somebody else';
  }

  /** Tells the board, and answers how it stands. */
  private told(id: number): LostFix {
    const row = this.lostFixes.row(id)!;
    if (row.roverId !== null) this.watch.lookAgain(row.roverId);
    const members = this.lostFixes.members(id).map((member) => member.id);
    this.changes.announce({ kind: 'lostFix', lostFixIds: [id, ...this.writer.takeTouched(), ...members] });
    return lostFixOf(this.lostFixes.records([id])[0]!);
  }
}
