// The correction check is also proved against casters and clients that others wrote: `str2str` of Debian's rtklib package.
// Installs it when it is missing and it may; without it those tests are skipped and say so.
import { spawnSync } from 'node:child_process';

const isThere = () => spawnSync('str2str', ['-h']).error === undefined;
if (!isThere()) {
  const mayInstall = process.getuid?.() === 0 && spawnSync('apt-get', ['--version']).status === 0;
  const run = (...args) =>
    spawnSync('apt-get', args, {
      stdio: 'inherit',
      env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    });
  if (mayInstall) {
    run('update', '-qq');
    run('install', '-y', '-qq', '--no-install-recommends', 'rtklib');
  }
  if (!isThere())
    console.warn('Tests against str2str are skipped. As root on Debian: apt-get install -y rtklib');
}
