import { Injectable } from '@nestjs/common';
import type { Limits } from '@hubtack/contracts/lost-fixes/limits.js';
import type { Diagnosis } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { FixesService } from '../fixes/fixes.service.js';
import { nextCorrections } from './corrections-watch.js';
import type { Evidence } from './diagnosis.js';
import { LostFixRepository } from './lost-fix.repository.js';
import { LostFixWriter } from './lost-fix.writer.js';
import { isOutageOver, outageOf, type MountPointRover } from './shared-cause.js';
import { isWorking, type WatchedRover } from './watched-rover.js';

/** After a restart, or when a rover comes in new, its corrections are followed from this long ago on. */
const FOLLOWED_BACK_MS = 15 * 60_000;
/** A fix that goes a little after the corrections are back was lost by the outage still. */
const AFTERMATH_MS = 60_000;
/** Corrections go before the fix does; never the other way about. */
const SLACK_MS = 60_000;

interface KnownOutage {
  id: number;
  mountPoint: string;
  start: number;
  end: number | null;
  roverIds: Set<number>;
  reporting: number;
  /** Since when it looks over; it is when that has lasted. */
  overSince: number | null;
}

const reportingOf = (seen: readonly MountPointRover[]): number =>
  seen.filter(({ isReporting }) => isReporting).length;

/** Follows the corrections of every rover, and keeps the lost fix of a mount point that has failed. */
@Injectable()
export class OutageKeeper {
  private readonly outages = new Map<string, KnownOutage>();
  private readonly followed = new Set<number>();

  constructor(
    private readonly fixes: FixesService,
    private readonly lostFixes: LostFixRepository,
    private readonly writer: LostFixWriter,
  ) {}

  /** Reads the open ones anew: after a start, or when a write was undone. */
  restore(): void {
    this.outages.clear();
    this.followed.clear();
    for (const row of this.lostFixes.openRows()) {
      if (row.kind !== 'mountPoint' || row.mountPoint === null) continue;
      const roverIds = this.lostFixes.members(row.id).map(({ roverId }) => roverId!);
      const known = {
        id: row.id,
        mountPoint: row.mountPoint,
        start: row.startAt,
        end: null,
        reporting: roverIds.length,
        overSince: null,
      };
      this.outages.set(row.mountPoint, { ...known, roverIds: new Set(roverIds) });
    }
  }

  /** Moves on to the newest epoch of a rover. */
  follow(rover: WatchedRover, now: number, limits: Limits): void {
    const { roverId } = rover.entry;
    const correctionLimits = {
      maxAgeMs: limits.maxAgeSeconds * 1000,
      ageClearsMs: limits.ageClearsSeconds * 1000,
    };
    const latest = this.fixes.latest(roverId);
    if (!this.followed.has(roverId)) {
      this.followed.add(roverId);
      const areFresh = latest?.ageMs != null && latest.ageMs < correctionLimits.ageClearsMs;
      const past = areFresh ? [] : this.fixes.epochs(roverId, now - FOLLOWED_BACK_MS, now);
      for (const epoch of past)
        rover.corrections = nextCorrections(rover.corrections, epoch, correctionLimits);
    }
    if (latest) rover.corrections = nextCorrections(rover.corrections, latest, correctionLimits);
  }

  sweep(rovers: Iterable<WatchedRover>, now: number, limits: Limits): void {
    const byMountPoint = new Map<string, { rover: WatchedRover; seen: MountPointRover }[]>();
    for (const rover of rovers) {
      const { mountPoint, roverId } = rover.entry;
      if (mountPoint === null) continue;
      const heldUntil = this.fixes.heldUntil(roverId);
      const isReporting = isWorking(rover, now, heldUntil) && (heldUntil ?? 0) > now;
      const { lostAt } = rover.corrections;
      // Corrections lost before it was moved here were another mount point's.
      const isOurs = lostAt !== null && lostAt >= rover.mountPointSince;
      const seen = { roverId, mountPoint, isReporting, lostAt: isOurs ? lostAt : null };
      const list = byMountPoint.get(mountPoint);
      if (list) list.push({ rover, seen });
      else byMountPoint.set(mountPoint, [{ rover, seen }]);
    }
    for (const [mountPoint, list] of byMountPoint) {
      const seen = list.map((one) => one.seen);
      const known = this.outages.get(mountPoint);
      if (known && known.end === null) this.goOn(known, list, seen, now, limits);
      else this.begin(mountPoint, list, seen, now, limits);
    }
    // All its rovers have been moved to another.
    for (const known of this.outages.values())
      if (known.end === null && !byMountPoint.has(known.mountPoint)) this.goOn(known, [], [], now, limits);
  }

  /** The mount point's lost fix that a loss beginning at this instant hangs under; null when it has another reason. */
  sharedIdFor(rover: WatchedRover, start: number): number | null {
    return this.outageFor(rover, start)?.id ?? null;
  }

  evidenceFor(rover: WatchedRover, start: number): Evidence['outage'] {
    const outage = this.outageFor(rover, start);
    if (!outage) return null;
    const { roverIds, reporting, mountPoint } = outage;
    return { rovers: roverIds.size, reporting: Math.max(reporting, roverIds.size), mountPoint };
  }

  private outageFor({ entry }: WatchedRover, start: number): KnownOutage | null {
    // Not by where it is now: it may have been moved since.
    const holds = (known: KnownOutage) =>
      known.roverIds.has(entry.roverId) &&
      start >= known.start - SLACK_MS &&
      start <= (known.end ?? Infinity) + AFTERMATH_MS;
    return [...this.outages.values()].find(holds) ?? null;
  }

  private begin(
    mountPoint: string,
    list: readonly { rover: WatchedRover }[],
    seen: readonly MountPointRover[],
    now: number,
    limits: Limits,
  ): void {
    const outage = outageOf(seen, now, limits.lostAfterSeconds * 1000);
    if (!outage) return;
    const roverIds = new Set(outage.roverIds);
    const known: KnownOutage = {
      id: 0,
      mountPoint,
      start: outage.start,
      end: null,
      roverIds,
      reporting: reportingOf(seen),
      overSince: null,
    };
    const diagnosis = this.diagnosisOf(known, list, now);
    const id = this.writer.raise({
      kind: 'mountPoint',
      mountPoint,
      startAt: outage.start,
      raisedAt: now,
      diagnosis,
      diagnosisAtRaising: diagnosis,
    });
    this.outages.set(mountPoint, { ...known, id });
    for (const row of this.lostFixes.openRows()) {
      if (row.roverId === null || !roverIds.has(row.roverId) || row.sharedId !== null) continue;
      if (row.startAt >= outage.start - SLACK_MS) this.writer.change(row.id, { sharedId: id });
    }
  }

  private diagnosisOf(
    { roverIds, reporting, mountPoint }: KnownOutage,
    list: readonly { rover: WatchedRover }[],
    at: number,
  ): Diagnosis {
    const names = list
      .filter(({ rover }) => roverIds.has(rover.entry.roverId))
      .map(({ rover }) => rover.entry.crewName ?? rover.entry.roverLabel)
      .toSorted();
    const count = `${roverIds.size} of ${Math.max(reporting, roverIds.size)} rovers on ${mountPoint}`;
    const evidence = [`${count} lost their corrections together`, names.join(', ')];
    return { cause: 'mountPointDown', evidence, runnerUp: null, at };
  }

  private goOn(
    outage: KnownOutage,
    list: readonly { rover: WatchedRover }[],
    seen: readonly MountPointRover[],
    now: number,
    limits: Limits,
  ): void {
    const before = outage.roverIds.size;
    for (const { roverId, lostAt } of seen)
      if (lostAt !== null && lostAt >= outage.start - SLACK_MS) outage.roverIds.add(roverId);
    outage.reporting = Math.max(outage.reporting, reportingOf(seen));
    if (outage.roverIds.size > before)
      this.writer.change(outage.id, { diagnosis: this.diagnosisOf(outage, list, now) });
    if (!isOutageOver(seen)) {
      outage.overSince = null;
      return;
    }
    outage.overSince ??= now;
    if (now - outage.overSince < limits.regainedAfterSeconds * 1000) return;
    outage.end = outage.overSince;
    this.writer.end(
      outage.id,
      outage.end,
      seen.some(({ isReporting }) => isReporting) ? 'regained' : 'shiftEnd',
    );
  }
}
