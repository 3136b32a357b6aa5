import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import react from '@vitejs/plugin-react';
import { defineConfig, type Plugin } from 'vite';

const server = 'http://127.0.0.1:3000';

/** Writes each script and style a second time, compressed: the server sends it as it is, and compresses nothing itself. */
const compressed = (): Plugin => ({
  name: 'hubtack-compressed',
  apply: 'build',
  writeBundle({ dir }, bundle) {
    for (const [name, output] of Object.entries(bundle)) {
      if (!/\.(js|css)$/.test(name)) continue;
      const content = output.type === 'chunk' ? output.code : output.source;
      writeFileSync(join(dir!, `${name}.gz`), gzipSync(content, { level: 9 }));
    }
  },
});

export default defineConfig({
  plugins: [react(), compressed()],
  resolve: { conditions: ['hubtack-source', 'module', 'browser', 'development|production'] },
  build: { manifest: true, target: 'es2022' },
  server: { proxy: { '/api': server } },
});
