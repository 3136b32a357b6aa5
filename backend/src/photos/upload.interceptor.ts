import { Injectable, type CallHandler, type ExecutionContext, type NestInterceptor } from '@nestjs/common';
import { MAX_PHOTOS, MAX_PHOTO_BYTES } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { Request, Response } from 'express';
import multer, { MulterError } from 'multer';
import { finalize, type Observable } from 'rxjs';
import type { Viewer } from '../auth/access.js';
import { ProblemException } from '../common/problem.exception.js';
import { PhotosService } from './photos.service.js';

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

const read = multer({
  storage: multer.memoryStorage(),
  limits: { fileSize: MAX_PHOTO_BYTES, files: MAX_PHOTOS, fields: 4, fieldSize: 1000 },
}).array('photos', MAX_PHOTOS);

/** Reads photos of a multipart body into memory, bounded, once it is clear that this viewer may send any; `request.files` holds them. */
@Injectable()
export class PhotoUploadInterceptor implements NestInterceptor {
  constructor(private readonly photos: PhotosService) {}

  async intercept(context: ExecutionContext, next: CallHandler): Promise<Observable<unknown>> {
    const http = context.switchToHttp();
    const request = http.getRequest<Request & { user: Viewer }>();
    this.photos.begin(request.user, Number(request.params.id));
    try {
      await new Promise<void>((resolve, reject) => {
        read(request, http.getResponse<Response>(), (error: unknown) => {
          if (error) reject(problemOf(error));
          else resolve();
        });
      });
    } catch (error) {
      this.photos.end();
      throw error;
    }
    return next.handle().pipe(finalize(() => this.photos.end()));
  }
}
