import { Injectable } from '@nestjs/common';
import type {
  MountPoint,
  MountPointList,
  MountPointQuery,
} from '@hubtack/contracts/corrections/mount-point.js';
import type { Viewer } from '../auth/access.js';
import { Clock } from '../common/clock.js';
import { ProblemException } from '../common/problem.exception.js';
import { CheckRunner } from './check-runner.js';
import { CorrectionSourcesService } from './correction-sources.service.js';
import { NtripProblem } from './ntrip/problem.js';
import { fetchMountPoints, withDistances } from './ntrip/read-source-table.js';
import { Places } from './places.js';
import { RunningChecks } from './running-checks.js';

/** A table is asked for again after this long: it changes a few times a year. */
const KEPT_MS = 60_000;
/** A caster that gave none is left alone for so long: it may be counting who asks in vain. */
const FAILED_MS = 15_000;

interface Kept {
  /** What it was asked with: another address is another table. */
  of: string;
  readAt: number;
  mountPoints: MountPoint[];
  oddities: string[];
}

interface Failed {
  of: string;
  at: number;
  problem: NtripProblem;
}

/** The mount points of a source's caster. */
@Injectable()
export class MountPointsService {
  private readonly kept = new Map<number, Kept>();
  private readonly failed = new Map<number, Failed>();

  constructor(
    private readonly sources: CorrectionSourcesService,
    private readonly runner: CheckRunner,
    private readonly running: RunningChecks,
    private readonly places: Places,
    private readonly clock: Clock,
  ) {}

  /** By distance from a place, where one is named; those without a place last. */
  async list(viewer: Viewer, sourceId: number, query: MountPointQuery): Promise<MountPointList> {
    const row = this.sources.row(sourceId);
    const place = this.places.of(query);
    const of = JSON.stringify([
      row.address,
      row.port,
      row.tls,
      row.ntripVersion,
      row.user,
      row.sealedPassword,
    ]);
    const known = this.kept.get(sourceId);
    const isFresh = known?.of === of && this.clock.now() - known.readAt < KEPT_MS;
    const table = isFresh ? known : await this.ask(viewer, sourceId, of);
    return {
      readAt: new Date(table.readAt).toISOString(),
      mountPoints: withDistances(table.mountPoints, place).toSorted(
        (a, b) =>
          (a.distanceM ?? Infinity) - (b.distanceM ?? Infinity) || (a.mountPoint < b.mountPoint ? -1 : 1),
      ),
      oddities: table.oddities,
    };
  }

  private async ask(viewer: Viewer, sourceId: number, of: string): Promise<Kept> {
    const failed = this.failed.get(sourceId);
    if (failed?.of === of && this.clock.now() - failed.at < FAILED_MS) throw asRefusal(failed.problem);
    const target = this.runner.targetOf(this.sources.row(sourceId), null);
    const { cancel } = this.running.begin(sourceId, viewer.name);
    try {
      const found = await fetchMountPoints(target, cancel.signal);
      const kept = { of, readAt: this.clock.now(), ...found };
      this.kept.set(sourceId, kept);
      return kept;
    } catch (error) {
      if (cancel.signal.aborted) throw new ProblemException(503, 'stopping', 'It was cancelled.');
      if (!(error instanceof NtripProblem)) throw error;
      this.failed.set(sourceId, { of, at: this.clock.now(), problem: error });
      throw asRefusal(error);
    } finally {
      this.running.end(sourceId);
    }
  }
}

const asRefusal = (problem: NtripProblem) =>
  new ProblemException(502, 'casterProblem', `${problem.message} ${problem.toTry}`, { cause: problem });
