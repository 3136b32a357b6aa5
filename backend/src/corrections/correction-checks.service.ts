import {
  Inject,
  Injectable,
  Logger,
  type BeforeApplicationShutdown,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import type {
  CheckReport,
  CheckStepName,
  CorrectionCheck,
  CorrectionCheckList,
  StartCheckBody,
} from '@hubtack/contracts/corrections/check.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { conflict, notFound, ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import { blankReport, failedStepOf, isLoginRefused } from './check/report.js';
import type { CheckTarget } from './check/run-check.js';
import { CheckRunner } from './check-runner.js';
import { checkOf, type CheckRow, type SourceRow } from './correction-source.view.js';
import { CorrectionSourcesRepository } from './correction-sources.repository.js';
import { CorrectionSourcesService } from './correction-sources.service.js';
import { Places, type Place } from './places.js';
import { RunningChecks } from './running-checks.js';
import { SealBroken } from './sealing.js';

/** After a refused login a person waits this long: casters shut out who hammers them. */
const AFTER_REFUSAL_MS = 30_000;
/** Failures that say nothing of the base: the login, the formats, a position that was not sent. */
const DOWN_STEPS: readonly CheckStepName[] = ['address', 'connection', 'sourceTable', 'mountPoint', 'data'];

export const saysDown = (step: CheckStepName | null): boolean => step !== null && DOWN_STEPS.includes(step);

/** Runs checks in the background, keeps what they found, and what follows from it. */
@Injectable()
export class CorrectionChecksService implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger(CorrectionChecksService.name);
  /** Reports of checks that run, by check. */
  private readonly live = new Map<number, CheckReport>();
  private readonly ends = new Set<Promise<void>>();

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly sources: CorrectionSourcesRepository,
    private readonly service: CorrectionSourcesService,
    private readonly runner: CheckRunner,
    private readonly running: RunningChecks,
    private readonly places: Places,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  onApplicationBootstrap(): void {
    this.sources.cutOff(this.clock.now());
  }

  async beforeApplicationShutdown(): Promise<void> {
    this.running.cancelAll();
    await this.settled();
  }

  /** Resolves when no check runs any more. */
  async settled(): Promise<void> {
    await Promise.all(this.ends);
  }

  list(sourceId: number): CorrectionCheckList {
    this.service.row(sourceId);
    return { checks: this.sources.checks(sourceId).map((row) => this.view(row)) };
  }

  get(sourceId: number, id: number): CorrectionCheck {
    const row = this.sources.check(sourceId, id);
    if (!row) throw notFound('This check');
    return this.view(row);
  }

  cancel(sourceId: number, id: number): void {
    if (this.get(sourceId, id).status !== 'running') throw conflict('This check is over.');
    this.running.cancel(sourceId);
  }

  /** Begins one; the answer is how it stands at once. `viewer` null: the timetable. */
  start(viewer: Pick<Viewer, 'name'> | null, sourceId: number, body: StartCheckBody): CorrectionCheck {
    const source = this.service.row(sourceId);
    const now = this.clock.now();
    const wait = source.refusedAt === null ? 0 : source.refusedAt + AFTER_REFUSAL_MS - now;
    if (wait > 0)
      throw new ProblemException(
        429,
        'tooManyRequests',
        'The caster has just refused this login. Look at it letter by letter first, or wait half a minute: casters shut out who keeps asking.',
        { retryAfterSeconds: Math.ceil(wait / 1000) },
      );
    const place = this.places.of(body);
    const target = this.targetOf(source, place);
    const work = this.running.begin(sourceId, viewer?.name ?? 'The timetable');
    const report = blankReport();
    const row = this.sources.insertCheck({
      sourceId,
      startedAt: now,
      status: 'running',
      by: viewer?.name ?? null,
      place: place?.words ?? null,
      report,
    });
    this.live.set(row.id, report);
    const end = this.run(row, target, work.cancel.signal).finally(() => this.ends.delete(end));
    this.ends.add(end);
    return this.view(row);
  }

  private targetOf(source: SourceRow, place: Place | null): CheckTarget {
    try {
      return this.runner.targetOf(source, place);
    } catch (error) {
      if (!(error instanceof SealBroken)) throw error;
      throw conflict(
        'The kept password cannot be opened: the key of this server is another. Type it again.',
        [{ pointer: '/password', detail: 'Type it again' }],
      );
    }
  }

  private async run(row: CheckRow, target: CheckTarget, signal: AbortSignal): Promise<void> {
    const { id, sourceId } = row;
    let isWhole = false;
    try {
      await this.runner.run(target, signal, (report) => this.live.set(id, report));
      isWhole = true;
    } catch (error) {
      if (!signal.aborted) this.logger.error({ err: error, check: id }, 'a check broke off');
    }
    const report = this.live.get(id)!;
    try {
      this.database.transaction(() => this.finish(row, report, isWhole));
    } catch (error) {
      this.logger.error({ err: error, check: id }, 'what a check found was not written');
    } finally {
      this.live.delete(id);
      this.running.end(sourceId);
    }
    this.changes.announce({ kind: 'firm' });
  }

  private finish({ id, sourceId }: CheckRow, report: CheckReport, isWhole: boolean): void {
    const now = this.clock.now();
    const failedStep = failedStepOf(report);
    this.sources.updateCheck(id, {
      status: isWhole ? 'done' : 'cancelled',
      endedAt: now,
      passed: isWhole ? failedStep === null : null,
      failedStep,
      report,
    });
    if (!isWhole) return;
    this.sources.update(sourceId, {
      refusedAt: isLoginRefused(report) ? now : null,
      ...this.downOrUp(sourceId, failedStep),
      ...decodedOf(report, now),
    });
  }

  /**
   * Down is what two looks in a row have found, at a source that has worked before: one failed look may be the way there, and one that
   * never passed may be mistyped.
   */
  private downOrUp(sourceId: number, failedStep: CheckStepName | null): { downSince?: number | null } {
    if (!saysDown(failedStep)) return { downSince: null };
    const [last, before] = this.sources.checks(sourceId, 2);
    const source = this.service.row(sourceId);
    const isSecond = before !== undefined && before.status === 'done' && saysDown(before.failedStep);
    if (!last || source.downSince !== null || !isSecond || !this.sources.hasEverPassed(sourceId)) return {};
    return { downSince: before.startedAt };
  }

  private view(row: CheckRow): CorrectionCheck {
    return checkOf({ ...row, report: this.live.get(row.id) ?? row.report });
  }
}

/** A real base that was read; a virtual one is wherever it was asked for. */
function decodedOf({ base }: CheckReport, now: number) {
  if (!base || base.isVirtual) return {};
  return {
    decodedAt: now,
    decodedStationId: base.stationId,
    decodedLatitude: base.latitude,
    decodedLongitude: base.longitude,
    decodedHeightM: base.heightM,
  };
}
