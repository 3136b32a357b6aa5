import { Inject, Injectable } from '@nestjs/common';
import { logFields, type Log, type LogFields, type LogWithDetail } from '@hubtack/contracts/logs/log.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { rovers } from '@hubtack/drizzle/schema/rovers.js';
import { eq } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Clock } from '../common/clock.js';
import { notFound, ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import { LogFiles } from './log.files.js';
import { refusalOfKind } from './log-kind.js';
import { LogQueue } from './log.queue.js';
import { LogsRepository } from './logs.repository.js';

/** Bodies that come in at once, and logs that wait to be read: bounds what may lie on the disk. */
const MOST_UPLOADS = 4;
const MOST_WAITING = 20;
const MAX_NAME_LENGTH = 200;

/** Takes logs in, and says what has become of them. */
@Injectable()
export class LogsService {
  private uploads = 0;

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly repository: LogsRepository,
    private readonly files: LogFiles,
    private readonly queue: LogQueue,
    private readonly audit: AuditService,
    private readonly clock: Clock,
  ) {}

  /** Before a body is read. */
  beginUpload(): void {
    if (this.uploads >= MOST_UPLOADS || this.repository.countUnread() + this.uploads >= MOST_WAITING)
      throw new ProblemException(
        503,
        'storageBusy',
        'Too many logs are waiting. Send it again in a minute.',
        {
          retryAfterSeconds: 60,
        },
      );
    this.uploads++;
  }

  endUpload(): void {
    this.uploads--;
  }

  /** The file is on disk: it gets its row, or goes. */
  async accept(
    viewer: Viewer,
    file: Express.Multer.File | undefined,
    body: Record<string, unknown> | undefined,
  ): Promise<{ id: number }> {
    if (!file) throw fileProblem('There is no file in it. Send the log in a field named file.');
    try {
      const refusal = refusalOfKind(await this.files.settle(file.filename));
      if (refusal) throw fileProblem(refusal);
      const id = this.record(viewer, file, fieldsOf(body));
      this.queue.wake();
      return { id };
    } catch (error) {
      await this.files.remove(file.filename);
      throw error;
    }
  }

  list(): Log[] {
    return this.repository.list((id) => this.queue.progressOf(id));
  }

  get(id: number): LogWithDetail {
    const log = this.repository.get(id, this.queue.progressOf(id));
    if (!log) throw notFound('This log');
    return log;
  }

  /** Stops a log that is still to be read, or removes one that has been. */
  async remove(viewer: Viewer, id: number): Promise<void> {
    const row = this.repository.row(id);
    if (!row) throw notFound('This log');
    const isUnread = row.status === 'waiting' || row.status === 'reading';
    this.database.transaction(() => {
      if (isUnread) this.queue.cancel(id);
      else this.repository.remove(id);
      this.audit.record(viewer, {
        action: isUnread ? 'log.cancelled' : 'log.removed',
        subject: row.name,
      });
    });
    if (row.file !== null) await this.files.remove(row.file);
  }

  private record(viewer: Viewer, file: Express.Multer.File, { date, roverId }: LogFields): number {
    const name = nameOf(file.originalname);
    return this.database.transaction((tx) => {
      const rover =
        roverId === undefined
          ? null
          : tx.select({ label: rovers.label }).from(rovers).where(eq(rovers.id, roverId)).get();
      if (rover === undefined) throw notFound('This rover');
      this.audit.record(viewer, {
        action: 'log.uploaded',
        subject: name,
        after: { bytes: file.size, ...(rover && { rover: rover.label }), ...(date && { date }) },
      });
      return this.repository.add({
        name,
        bytes: file.size,
        at: this.clock.now(),
        by: viewer.name,
        date: date ?? null,
        roverId: roverId ?? null,
        file: file.filename,
      });
    });
  }
}

function fileProblem(detail: string): ProblemException {
  return new ProblemException(400, 'unreadable', detail, { errors: [{ pointer: '/file', detail }] });
}

/** A form sends what was left empty as empty text. */
function fieldsOf(body: Record<string, unknown> | undefined): LogFields {
  const filled = Object.entries(body ?? {}).filter(([, value]) => value !== '');
  const result = logFields.safeParse(Object.fromEntries(filled));
  if (result.success) return result.data;
  const errors = result.error.issues.map(({ path, message }) => ({
    pointer: `/${path.join('/')}`,
    detail: message,
  }));
  throw new ProblemException(400, 'invalidBody', errors[0]!.detail, { errors });
}

/** As people called the file, without folders and without what no screen can show. */
function nameOf(original: string): string {
  const name = (original.split(/[/\\]/).at(-1) ?? '').replaceAll(/\p{C}/gu, '').trim();
  return name.slice(0, MAX_NAME_LENGTH) || 'log';
}
