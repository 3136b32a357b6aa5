import {
  mixin,
  type CallHandler,
  type ExecutionContext,
  type NestInterceptor,
  type Type,
} from '@nestjs/common';
import { MAX_PHOTOS, MAX_PHOTO_BYTES } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { Request, Response } from 'express';
import multer, { MulterError } from 'multer';
import type { Observable } from 'rxjs';
import { ProblemException } from '../common/problem.exception.js';

const refusals: Partial<Record<MulterError['code'], { status: number; detail: string }>> = {
  LIMIT_FILE_SIZE: { status: 413, detail: `A photo may have at most ${MAX_PHOTO_BYTES / 2 ** 20} MB.` },
  LIMIT_FILE_COUNT: { status: 400, detail: `At most ${MAX_PHOTOS} photos at once.` },
  LIMIT_UNEXPECTED_FILE: {
    status: 400,
    detail: `At most ${MAX_PHOTOS} files, each in a field named photos.`,
  },
};

function problemOf(error: unknown): unknown {
  if (!(error instanceof MulterError)) {
    // A body that is no multipart, or is cut off.
    return new ProblemException(400, 'badRequest', 'The photos did not arrive whole.', { cause: error });
  }
  const { status, detail } = refusals[error.code] ?? { status: 400, detail: 'The photos cannot be read.' };
  return new ProblemException(status, status === 413 ? 'tooLarge' : 'invalidBody', detail, {
    errors: [{ pointer: '/photos', detail }],
  });
}

/** Reads photos of a multipart body into memory, bounded; `request.files` holds them. Runs after the guard: strangers upload nothing. */
export function PhotoUpload(): Type<NestInterceptor> {
  const read = multer({
    storage: multer.memoryStorage(),
    limits: { fileSize: MAX_PHOTO_BYTES, files: MAX_PHOTOS, fields: 4, fieldSize: 1000 },
  }).array('photos', MAX_PHOTOS);

  class UploadInterceptor implements NestInterceptor {
    async intercept(context: ExecutionContext, next: CallHandler): Promise<Observable<unknown>> {
      const http = context.switchToHttp();
      await new Promise<void>((resolve, reject) => {
        read(http.getRequest<Request>(), http.getResponse<Response>(), (error: unknown) => {
          if (error) reject(problemOf(error) as Error);
          else resolve();
        });
      });
      return next.handle();
    }
  }
  return mixin(UploadInterceptor);
}
