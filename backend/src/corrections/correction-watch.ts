import {
  Injectable,
  Logger,
  type BeforeApplicationShutdown,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import { Clock } from '../common/clock.js';
import { ProblemException } from '../common/problem.exception.js';
import { CorrectionChecksService, saysDown } from './correction-checks.service.js';
import { CorrectionSourcesRepository } from './correction-sources.repository.js';
import { RunningChecks } from './running-checks.js';
import { isDue } from './watch-plan.js';

const LOOK_MS = 5000;
const TIMETABLE = 'The timetable';

/** Checks sources on their timetable, one at a time. */
@Injectable()
export class CorrectionWatch implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger(CorrectionWatch.name);
  private timer: NodeJS.Timeout | null = null;
  private current: number | null = null;

  constructor(
    private readonly sources: CorrectionSourcesRepository,
    private readonly checks: CorrectionChecksService,
    private readonly running: RunningChecks,
    private readonly clock: Clock,
  ) {}

  onApplicationBootstrap(): void {
    this.timer = setInterval(() => this.tick(), LOOK_MS);
  }

  beforeApplicationShutdown(): void {
    if (this.timer) clearInterval(this.timer);
  }

  /** Begins the check that is due, if one is and none of the timetable's is under way. */
  tick(): void {
    if (this.current !== null && this.running.isBusy(this.current)) return;
    this.current = null;
    const now = this.clock.now();
    for (const { id, watchMinutes, refusedAt, downSince } of this.sources.watched()) {
      const [last] = this.sources.checks(id, 1);
      const watched = {
        id,
        watchMinutes: watchMinutes!,
        isRefused: refusedAt !== null,
        isDown: downSince !== null,
        last: last ? { startedAt: last.startedAt, saysDown: saysDown(last.failedStep) } : null,
      };
      if (!isDue(watched, now) || this.running.isBusy(id)) continue;
      try {
        this.checks.start(null, id, {});
        this.current = id;
        return;
      } catch (error) {
        // Too many at once, or a password that cannot be opened: the next look tries again.
        if (!(error instanceof ProblemException)) throw error;
        this.logger.warn({ source: id, reason: error.message }, `${TIMETABLE} could not check a source`);
      }
    }
  }
}
