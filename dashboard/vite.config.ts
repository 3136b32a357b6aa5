import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

const server = 'http://127.0.0.1:3000';

export default defineConfig({
  plugins: [react()],
  resolve: { conditions: ['hubtack-source', 'module', 'browser', 'development|production'] },
  build: { manifest: true, target: 'es2022' },
  server: { proxy: { '/api': server } },
});
