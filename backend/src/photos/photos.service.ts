import { Inject, Injectable, Logger } from '@nestjs/common';
import { Interval } from '@nestjs/schedule';
import { MAX_PHOTOS, type Photo } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { lostFixHistory, lostFixPhotos } from '@hubtack/drizzle/schema/lost-fixes.js';
import { and, eq } from 'drizzle-orm';
import type { ReadStream } from 'node:fs';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { conflict, notFound, ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import { LostFixAccess } from '../lost-fixes/lost-fix.access.js';
import { LostFixRepository } from '../lost-fixes/lost-fix.repository.js';
import { TapsService } from '../taps/taps.service.js';
import { ImageError, storedImage, type StoredImage } from './image.js';
import { PhotoFiles } from './photo.files.js';

/** Each may hold four photos of ten megabytes. */
const MOST_UPLOADS = 6;

/** Photos of lost fixes: all of a post are kept, or none. */
@Injectable()
export class PhotosService {
  private readonly logger = new Logger(PhotosService.name);
  private queue: Promise<unknown> = Promise.resolve();
  /** Bodies that are being read, or wait for their turn. */
  private uploads = 0;

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly files: PhotoFiles,
    private readonly lostFixes: LostFixRepository,
    private readonly access: LostFixAccess,
    private readonly taps: TapsService,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  /** Before a body is read: strangers send nothing, and only so many bodies are in memory at once. */
  begin(viewer: Viewer, lostFixId: number): void {
    this.access.visible(viewer, lostFixId);
    if (this.uploads >= MOST_UPLOADS)
      throw new ProblemException(503, 'storageBusy', 'Too many photos are on their way. Send them again.', {
        retryAfterSeconds: 5,
      });
    this.uploads++;
  }

  end(): void {
    this.uploads--;
  }

  /** Adds photos; answers all that the lost fix has now. With a key that was answered before, that answer again. */
  add(
    viewer: Viewer,
    lostFixId: number,
    files: readonly Buffer[],
    key: string | undefined,
  ): Promise<Photo[]> {
    // One post after the other: pictures take the processor, and the same post twice at once must be seen as such.
    const mine = this.queue.then(() => this.addNow(viewer, lostFixId, files, key));
    this.queue = mine.catch(() => undefined);
    return mine;
  }

  private async addNow(
    viewer: Viewer,
    lostFixId: number,
    files: readonly Buffer[],
    key: string | undefined,
  ): Promise<Photo[]> {
    const request = `POST /api/lost-fixes/${lostFixId}/photos`;
    const before = key === undefined ? null : this.taps.answered<Photo[]>(viewer, key, request);
    if (before) return before.answer;
    if (files.length === 0) throw refusal('There is no photo in it.');
    this.checkRoom(lostFixId, files.length);
    const images: StoredImage[] = [];
    for (const [index, file] of files.entries()) images.push(await converted(file, index));
    const names: string[] = [];
    let photos: Photo[];
    try {
      for (const { bytes } of images) names.push(await this.files.write(bytes));
      photos = this.record(viewer, lostFixId, images, names, key, request);
    } catch (error) {
      await this.files.remove(names);
      throw error;
    }
    this.changes.announce({ kind: 'lostFix', lostFixIds: [lostFixId] });
    return photos;
  }

  open(viewer: Viewer, lostFixId: number, photoId: number): ReadStream {
    this.access.visible(viewer, lostFixId);
    const row = this.database
      .select({ file: lostFixPhotos.file })
      .from(lostFixPhotos)
      .where(and(eq(lostFixPhotos.id, photoId), eq(lostFixPhotos.lostFixId, lostFixId)))
      .get();
    if (!row) throw notFound('This photo');
    const file = this.files.read(row.file);
    if (!file) throw notFound('This photo');
    return file;
  }

  /** A file whose post was cut off between writing and recording belongs to nobody. */
  @Interval(DAY_MS)
  async dropOrphans(): Promise<void> {
    try {
      const old = await this.files.untouchedSince(this.clock.now() - DAY_MS);
      const known = new Set(
        this.database
          .select({ file: lostFixPhotos.file })
          .from(lostFixPhotos)
          .all()
          .map(({ file }) => file),
      );
      await this.files.remove(old.filter((name) => !known.has(name)));
    } catch (error) {
      this.logger.error({ err: error }, 'orphaned photos were not looked for; tomorrow goes on');
    }
  }

  private record(
    viewer: Viewer,
    lostFixId: number,
    images: readonly StoredImage[],
    names: readonly string[],
    key: string | undefined,
    request: string,
  ): Photo[] {
    return this.taps.once(viewer, key, request, () => {
      this.checkRoom(lostFixId, images.length);
      const at = this.clock.now();
      const by = viewer.name;
      for (const [index, { width, height }] of images.entries())
        this.database
          .insert(lostFixPhotos)
          .values({ lostFixId, at, by, file: names[index]!, width, height })
          .run();
      const text = images.length === 1 ? 'A photo' : `${images.length} photos`;
      this.database.insert(lostFixHistory).values({ lostFixId, at, by, kind: 'photo', text }).run();
      return this.lostFixes.photos(lostFixId);
    });
  }

  private checkRoom(lostFixId: number, count: number): void {
    const there = this.lostFixes.photos(lostFixId).length;
    if (there + count > MAX_PHOTOS)
      throw conflict(
        `At most ${MAX_PHOTOS} photos for one lost fix; there ${there === 1 ? 'is' : 'are'} ${there}.`,
      );
  }
}

function refusal(detail: string, index = 0): ProblemException {
  return new ProblemException(400, 'invalidBody', detail, {
    errors: [{ pointer: `/photos/${index}`, detail }],
  });
}

async function converted(file: Buffer, index: number): Promise<StoredImage> {
  try {
    return await storedImage(file);
  } catch (error) {
    if (error instanceof ImageError) throw refusal(error.message, index);
    throw error;
  }
}
