import { randomUUID } from 'node:crypto';
import { existsSync, mkdirSync } from 'node:fs';
import { open, readdir, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { Inject, Injectable } from '@nestjs/common';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { HEAD_BYTES } from './log-kind.js';

const NAME = /^[0-9a-f-]{36}\.log$/;

/** Uploaded logs as files in one folder, until they have been read. */
@Injectable()
export class LogFiles {
  private readonly folder: string;

  constructor(@Inject(ENVIRONMENT) environment: Environment) {
    this.folder = join(environment.UPLOADS_DIR, 'logs');
  }

  /** The folder, made when it is not there. */
  prepare(): string {
    mkdirSync(this.folder, { recursive: true, mode: 0o700 });
    return this.folder;
  }

  newName(): string {
    return `${randomUUID()}.log`;
  }

  path(name: string): string {
    if (!NAME.test(name)) throw new Error(`no log's name: ${name}`);
    return join(this.folder, name);
  }

  exists(name: string): boolean {
    return existsSync(this.path(name));
  }

  /** The first bytes, once all of the file is on disk to stay: whoever is answered after this can rely on it. */
  async settle(name: string): Promise<Uint8Array> {
    const file = await open(this.path(name), 'r+');
    try {
      await file.sync();
      const { buffer, bytesRead } = await file.read(new Uint8Array(HEAD_BYTES), 0, HEAD_BYTES, 0);
      return buffer.subarray(0, bytesRead);
    } finally {
      await file.close();
      const folder = await open(this.folder, 'r');
      await folder.sync();
      await folder.close();
    }
  }

  async remove(name: string): Promise<void> {
    await rm(this.path(name), { force: true });
  }

  /** Removes all but these: uploads that broke off with the process. */
  async removeOthers(names: ReadonlySet<string>): Promise<void> {
    const there = await readdir(this.folder).catch(() => []);
    for (const name of there) if (NAME.test(name) && !names.has(name)) await this.remove(name);
  }
}
