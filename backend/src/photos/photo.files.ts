import { randomUUID } from 'node:crypto';
import { createReadStream, existsSync, mkdirSync, type ReadStream } from 'node:fs';
import { readdir, rename, rm, stat, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { Inject, Injectable } from '@nestjs/common';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';

const NAME = /^[0-9a-f-]{36}\.webp$/;
const UNFINISHED = '.part';

/** Photos as files, in one folder, under names that nobody can guess. */
@Injectable()
export class PhotoFiles {
  private readonly folder: string;

  constructor(@Inject(ENVIRONMENT) environment: Environment) {
    this.folder = join(environment.UPLOADS_DIR, 'photos');
  }

  /** Written whole under another name first: a file with a photo's name is always a whole photo. Answers the name. */
  async write(bytes: Buffer): Promise<string> {
    mkdirSync(this.folder, { recursive: true, mode: 0o700 });
    const name = `${randomUUID()}.webp`;
    const path = join(this.folder, name);
    try {
      await writeFile(path + UNFINISHED, bytes, { mode: 0o600, flush: true });
      await rename(path + UNFINISHED, path);
    } catch (error) {
      await rm(path + UNFINISHED, { force: true });
      throw error;
    }
    return name;
  }

  /** Null when the file is gone, as after a restore without the uploads. */
  read(name: string): ReadStream | null {
    const path = this.path(name);
    return existsSync(path) ? createReadStream(path) : null;
  }

  async remove(names: readonly string[]): Promise<void> {
    for (const name of names) await rm(this.path(name), { force: true });
  }

  /** Names of photos that have not been touched since an instant, unfinished ones included; what is not ours is left alone. */
  async untouchedSince(instant: number): Promise<string[]> {
    const names = await readdir(this.folder).catch(() => []);
    const old: string[] = [];
    for (const name of names.filter((one) => NAME.test(one.replace(UNFINISHED, '')))) {
      // Gone meanwhile is gone.
      const known = await stat(join(this.folder, name)).catch(() => null);
      if (known && known.mtimeMs < instant) old.push(name);
    }
    return old;
  }

  private path(name: string): string {
    if (!NAME.test(name.replace(UNFINISHED, ''))) throw new Error(`no photo's name: ${name}`);
    return join(this.folder, name);
  }
}
