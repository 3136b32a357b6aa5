import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import react from '@vitejs/plugin-react';
import { defineConfig, type Plugin } from 'vite';
import { VitePWA } from 'vite-plugin-pwa';

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

/** What opens without signal: the shell, signing in, the chief's page and the set-up card. The rest of the office stays at home. */
const opensOffline =
  /\/src\/(main\.tsx|features\/(my-crew\/my-crew-page|set-up\/set-up-page|sign-in\/sign-in-page)\.tsx)$/;
const keptFiles = new Set<string>();

const findKeptFiles = (): Plugin => ({
  name: 'hubtack-kept-files',
  apply: 'build',
  generateBundle(_, bundle) {
    const keep = (name: string): void => {
      const chunk = bundle[name];
      if (keptFiles.has(name) || chunk?.type !== 'chunk') return;
      keptFiles.add(name);
      for (const style of chunk.viteMetadata?.importedCss ?? []) keptFiles.add(style);
      chunk.imports.forEach(keep);
    };
    for (const [name, chunk] of Object.entries(bundle)) {
      if (chunk.type === 'chunk' && (chunk.isEntry || opensOffline.test(chunk.facadeModuleId ?? '')))
        keep(name);
    }
  },
});

const WEEK_SECONDS = 7 * 86_400;

/**
 * The service worker. Its functions are written out as text: they see nothing of this file but what stands inside them.
 */
const offline = VitePWA({
  registerType: 'prompt',
  injectRegister: false,
  includeManifestIcons: false,
  manifest: {
    name: 'Hubtack',
    short_name: 'Hubtack',
    description: 'How the fix stands, and one button to say that it does not',
    id: '/my-crew',
    start_url: '/my-crew',
    scope: '/',
    display: 'standalone',
    background_color: '#f7f5ef',
    theme_color: '#fffdf7',
    icons: [
      { src: '/icons/mark-192.png', sizes: '192x192', type: 'image/png' },
      { src: '/icons/mark-512.png', sizes: '512x512', type: 'image/png' },
      { src: '/icons/mark-maskable-512.png', sizes: '512x512', type: 'image/png', purpose: 'maskable' },
    ],
  },
  workbox: {
    inlineWorkboxRuntime: true,
    clientsClaim: true,
    globPatterns: ['index.html', 'mark.svg', 'assets/*.{js,css}', 'assets/work-sans-latin-*.woff2'],
    manifestTransforms: [
      (entries) => ({
        manifest: entries.filter(({ url }) => !/\.(js|css)$/.test(url) || keptFiles.has(url)),
        warnings: [],
      }),
    ],
    navigateFallback: '/index.html',
    // Other pages come from the server, as their code does: an older shell would ask for code that is gone.
    navigateFallbackAllowlist: [/^\/(my-crew|sign-in|rovers\/\d+\/set-up)\/?$/],
    runtimeCaching: [
      {
        urlPattern: /\/api\/(crews\/\d+\/day|auth\/me|set-up-cards\/start\?roverId=\d+)$/,
        handler: 'NetworkFirst',
        options: {
          cacheName: 'hubtack-answers',
          networkTimeoutSeconds: 5,
          expiration: { maxEntries: 6, maxAgeSeconds: WEEK_SECONDS },
          plugins: [
            {
              // Chromium drops the old answer before the new one has come through: only whole ones go in.
              cacheWillUpdate: async ({ response }) => {
                if (response.status !== 200) return null;
                const body = await response.arrayBuffer();
                return new Response(body, { status: response.status, headers: response.headers });
              },
              cachedResponseWillBeUsed: async ({ cachedResponse }) => {
                if (!cachedResponse) return null;
                const headers = new Headers(cachedResponse.headers);
                headers.set('x-hubtack-kept', '1');
                return new Response(cachedResponse.body, { status: cachedResponse.status, headers });
              },
            },
          ],
        },
      },
      {
        // What one person has read is not the next one's: signing out or in, or a sign-in that has ended, empties it.
        urlPattern: /\/api\/auth\/(?!refresh)[^?]*$/,
        method: 'POST',
        handler: async ({ request }) => {
          await caches.delete('hubtack-answers');
          return fetch(request);
        },
      },
      {
        urlPattern: /\/api\/auth\/refresh$/,
        method: 'POST',
        handler: async ({ request }) => {
          const answer = await fetch(request);
          if (answer.status === 401) await caches.delete('hubtack-answers');
          return answer;
        },
      },
    ],
  },
});

export default defineConfig({
  plugins: [react(), compressed(), findKeptFiles(), offline],
  resolve: { conditions: ['hubtack-source', 'module', 'browser', 'development|production'] },
  build: { manifest: true, target: 'es2022' },
  server: { proxy: { '/api': server } },
});
