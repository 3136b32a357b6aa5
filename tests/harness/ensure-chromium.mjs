// Browser tests drive Debian's Chromium. Installs it when it is missing and it may; else says how.
import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';

const CHROMIUM = '/usr/bin/chromium';
if (!existsSync(CHROMIUM)) {
  const mayInstall = process.getuid?.() === 0 && spawnSync('apt-get', ['--version']).status === 0;
  if (!mayInstall) {
    console.error(
      'Browser tests need Chromium. As root on Debian: apt-get update && apt-get install -y chromium',
    );
    process.exit(1);
  }
  const run = (...args) =>
    spawnSync('apt-get', args, {
      stdio: 'inherit',
      env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    });
  run('update', '-qq');
  if (run('install', '-y', '-qq', 'chromium').status !== 0) process.exit(1);
}
