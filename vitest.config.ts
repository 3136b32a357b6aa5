import { availableParallelism } from 'node:os';
import { defineConfig } from 'vitest/config';

// Workspaces are read from their sources, so a test never runs against a stale build.
const source = {
  resolve: { conditions: ['hubtack-source'] },
  // Vitest hands these on to Node for packages too, so nothing that would turn a require into an import.
  ssr: { resolve: { conditions: ['hubtack-source', 'node'] } },
};

// Two at least: most tests wait for sockets and disks. The browser's come afterwards, alone.
const together = {
  maxWorkers: Math.max(2, availableParallelism() - 1),
  sequence: { groupOrder: 0 },
};

export default defineConfig({
  test: {
    reporters: ['default', './tests/harness/summary-reporter.ts'],
    projects: [
      {
        ...source,
        test: {
          name: 'unit',
          ...together,
          include: [
            '{contracts,backend,simulators,dashboard}/src/**/*.spec.{ts,tsx}',
            'drizzle/**/*.spec.ts',
          ],
          exclude: ['**/dist/**', '**/node_modules/**'],
          testTimeout: 20_000,
        },
      },
      {
        ...source,
        test: {
          name: 'integration',
          ...together,
          include: ['tests/{reference,integration,faults}/**/*.spec.ts'],
          exclude: ['**/dist/**', '**/node_modules/**'],
          testTimeout: 60_000,
          hookTimeout: 60_000,
        },
      },
      {
        ...source,
        test: {
          name: 'e2e',
          sequence: { groupOrder: 1 },
          include: ['tests/e2e/**/*.spec.ts'],
          exclude: ['**/dist/**', '**/node_modules/**'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
