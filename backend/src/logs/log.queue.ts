import {
  Inject,
  Injectable,
  Logger,
  type BeforeApplicationShutdown,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import type { LogHistory as HistoryCounts } from '@hubtack/contracts/logs/log.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { AuditService } from '../audit/audit.service.js';
import { Clock } from '../common/clock.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { DATABASE } from '../database/database.module.js';
import { RosterRepository } from '../rovers/roster.repository.js';
import { SettingsService } from '../settings/settings.service.js';
import { LogFiles } from './log.files.js';
import { LogHistory } from './log-history.js';
import type { LogTask } from './log-messages.js';
import { LogThread, type Outcome } from './log-thread.js';
import { LogsRepository, type SmallLogRow } from './logs.repository.js';

/** Reads logs one after the other. What had not been read when the server stopped is read again: its upload was answered for. */
@Injectable()
export class LogQueue implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger(LogQueue.name);
  private reading: { id: number; thread: LogThread } | null = null;
  private running: Promise<void> | null = null;
  /** Something has come in since what waits was last looked through. */
  private isWanted = false;
  private stopping = false;

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    @Inject(ENVIRONMENT) private readonly environment: Environment,
    private readonly repository: LogsRepository,
    private readonly files: LogFiles,
    private readonly history: LogHistory,
    private readonly settings: SettingsService,
    private readonly roster: RosterRepository,
    private readonly audit: AuditService,
    private readonly clock: Clock,
  ) {}

  async onApplicationBootstrap(): Promise<void> {
    for (const { id, file } of this.repository.unread())
      if (file !== null && this.files.exists(file)) this.repository.change(id, { status: 'waiting' });
      else this.fail(id, 'The file is no longer there. Upload it again.');
    await this.files.removeOthers(this.repository.files());
    this.wake();
  }

  /** Before the storage closes: what it then refuses must not fail a log. */
  async beforeApplicationShutdown(): Promise<void> {
    this.stopping = true;
    await this.reading?.thread.stop();
    await this.running;
  }

  /** Something may be waiting. */
  wake(): void {
    this.isWanted = true;
    if (this.running || this.stopping) return;
    this.running = this.readAll()
      .catch((error: unknown) =>
        this.logger.error({ err: error }, 'reading logs stopped; the next upload goes on'),
      )
      .finally(() => {
        this.running = null;
        if (this.isWanted) this.wake();
      });
  }

  progressOf(id: number): number {
    return this.reading?.id === id ? this.reading.thread.progress : 0;
  }

  /** Call inside the transaction that says who did it. The file is the caller's to remove. */
  cancel(id: number): void {
    this.repository.change(id, { status: 'cancelled', file: null });
    if (this.reading?.id === id) void this.reading.thread.stop();
  }

  private async readAll(): Promise<void> {
    for (;;) {
      this.isWanted = false;
      const [row] = this.stopping ? [] : this.repository.unread();
      if (!row) return;
      await this.read(row);
      if (this.stopping) return;
      if (row.file !== null) await this.files.remove(row.file);
    }
  }

  private async read(row: SmallLogRow): Promise<void> {
    const counts: HistoryCounts = { accepted: 0, duplicates: 0, refused: 0, reasons: [] };
    this.repository.change(row.id, { status: 'reading' });
    let outcome: Outcome;
    try {
      const thread = new LogThread(this.taskOf(row));
      this.reading = { id: row.id, thread };
      outcome = await thread.outcome(async (batch) => {
        const written = await this.history.store(row.roverId!, batch);
        counts.accepted += written.accepted;
        counts.duplicates += written.duplicates;
      });
    } catch (error) {
      if (this.stopping) return;
      this.logger.error({ err: error, logId: row.id }, 'a log could not be read');
      outcome = { kind: 'failed', problem: problemOf(error) };
    } finally {
      this.reading = null;
    }
    if (this.stopping) return;
    this.record(row, outcome, counts);
  }

  private record(row: SmallLogRow, outcome: Outcome, counts: HistoryCounts): void {
    const { id, roverId, name } = row;
    const entered = roverId === null ? null : counts;
    this.database.transaction(() => {
      // Cancelled in its last moment: it stays cancelled.
      const isCancelled = this.repository.row(id)?.status !== 'reading';
      if (isCancelled || outcome.kind === 'stopped') {
        if (counts.accepted > 0)
          this.repository.change(id, {
            problem: `Cancelled after ${counts.accepted} epochs had entered the history of the rover; they stay there.`,
          });
      } else if (outcome.kind === 'failed') this.fail(id, outcome.problem);
      else {
        const history = entered && { ...entered, ...outcome.refused };
        this.repository.change(id, {
          status: 'done',
          file: null,
          summary: outcome.summary,
          detail: { ...outcome.detail, history },
        });
      }
      if (entered && counts.accepted > 0) {
        const { accepted, duplicates } = counts;
        this.audit.record(null, {
          action: 'log.enteredHistory',
          subject: name,
          after: { accepted, duplicates },
        });
      }
    });
  }

  private taskOf({ file, bytes, at, date, roverId }: SmallLogRow): LogTask {
    const now = this.clock.now();
    const entry = this.roster.list(now).find((one) => one.roverId === roverId);
    const hasBase = entry !== undefined && entry.baseLatitude !== null && entry.baseLongitude !== null;
    return {
      path: this.files.path(file!),
      bytes,
      receivedAt: at,
      date,
      limits: this.settings.get().limits,
      base: hasBase ? { latitude: entry.baseLatitude!, longitude: entry.baseLongitude! } : null,
      history: roverId === null ? null : { now, rawEpochDays: this.environment.RAW_EPOCH_DAYS },
    };
  }

  private fail(id: number, problem: string): void {
    this.repository.change(id, { status: 'failed', problem, file: null });
  }
}

function problemOf(error: unknown): string {
  const code = String((error as { code?: unknown } | null)?.code);
  if (code.startsWith('SQLITE_FULL') || code.startsWith('SQLITE_IOERR'))
    return 'The server cannot write to its disk. Upload it again later: what has entered the history is not entered twice.';
  if (code === 'ERR_WORKER_OUT_OF_MEMORY') return 'It needs more memory to be read than a log may have.';
  return 'It could not be read to its end: something went wrong here.';
}
