import { Injectable, type CallHandler, type ExecutionContext, type NestInterceptor } from '@nestjs/common';
import { MAX_LOG_BYTES } from '@hubtack/contracts/logs/log.js';
import type { Request, Response } from 'express';
import multer, { MulterError } from 'multer';
import { finalize, type Observable } from 'rxjs';
import { ProblemException } from '../common/problem.exception.js';
import { LogFiles } from './log.files.js';
import { LogsService } from './logs.service.js';

const TOO_LARGE = `A log may have at most ${MAX_LOG_BYTES / 2 ** 20} MB. Upload it in parts.`;
/** An upload that brings nothing for so long has broken off. */
const STALLED_MS = 60_000;
/** What a multipart body has beside the file. */
const OVERHEAD_BYTES = 64 * 1024;

const refusals: Partial<Record<MulterError['code'], string>> = {
  LIMIT_FILE_COUNT: 'One log at a time.',
  LIMIT_UNEXPECTED_FILE: 'One log at a time, in a field named file.',
};

const tooLarge = () =>
  new ProblemException(413, 'tooLarge', TOO_LARGE, { errors: [{ pointer: '/file', detail: TOO_LARGE }] });

function problemOf(error: unknown): unknown {
  const { code } = error as { code?: string };
  if (code === 'ENOSPC' || code === 'EDQUOT' || code === 'EROFS')
    return new ProblemException(503, 'storageFull', 'The server cannot write to its disk. Try again later.', {
      retryAfterSeconds: 5,
      cause: error,
    });
  if (!(error instanceof MulterError))
    // A body that is no multipart, or is cut off.
    return new ProblemException(400, 'badRequest', 'The log did not arrive whole.', { cause: error });
  if (error.code === 'LIMIT_FILE_SIZE') return tooLarge();
  const detail = refusals[error.code] ?? 'The log cannot be read.';
  return new ProblemException(400, 'invalidBody', detail, { errors: [{ pointer: '/file', detail }] });
}

/** Streams the file of a multipart body to disk, never into memory; `request.file` says where. What breaks off leaves nothing behind. */
@Injectable()
export class LogUploadInterceptor implements NestInterceptor {
  private readonly read;

  constructor(
    private readonly logs: LogsService,
    files: LogFiles,
  ) {
    this.read = multer({
      storage: multer.diskStorage({
        destination: (_request, _file, done) => done(null, files.prepare()),
        filename: (_request, _file, done) => done(null, files.newName()),
      }),
      limits: { fileSize: MAX_LOG_BYTES, files: 1, fields: 4, fieldSize: 1000 },
      defParamCharset: 'utf8',
    }).single('file');
  }

  async intercept(context: ExecutionContext, next: CallHandler): Promise<Observable<unknown>> {
    const http = context.switchToHttp();
    const request = http.getRequest<Request>();
    // Said by its length alone: nothing is read, nothing is written.
    if (Number(request.headers['content-length'] ?? 0) > MAX_LOG_BYTES + OVERHEAD_BYTES) throw tooLarge();
    this.logs.beginUpload();
    request.setTimeout(STALLED_MS, () => request.destroy());
    try {
      await new Promise<void>((resolve, reject) => {
        this.read(request, http.getResponse<Response>(), (error: unknown) => {
          if (error) reject(problemOf(error));
          else resolve();
        });
      });
    } catch (error) {
      this.logs.endUpload();
      throw error;
    } finally {
      request.setTimeout(0);
    }
    return next.handle().pipe(finalize(() => this.logs.endUpload()));
  }
}
