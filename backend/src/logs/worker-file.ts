import { existsSync } from 'node:fs';

/**
 * Where the built thread program lies: beside this file in a build; from the sources, which a thread cannot run, in the build
 * next to them.
 */
export function workerFile(): URL {
  const beside = new URL('./log.worker.js', import.meta.url);
  if (existsSync(beside)) return beside;
  return new URL('../../dist/logs/log.worker.js', import.meta.url);
}
