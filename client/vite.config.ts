import { fileURLToPath } from 'node:url';
import react from '@vitejs/plugin-react';
import { defaultClientConditions } from 'vite';
import { defineConfig } from 'vitest/config';
import { leanThemeCss } from './scripts/lean-theme-css.ts';

const api = process.env.API_URL ?? 'http://127.0.0.1:4600';

const source = fileURLToPath(new URL('./src', import.meta.url));

export default defineConfig({
  plugins: [react(), leanThemeCss(source)],
  resolve: { conditions: ['@kerfyard/source', ...defaultClientConditions] },
  ssr: { resolve: { conditions: ['@kerfyard/source'] } },
  server: {
    host: '127.0.0.1',
    port: Number(process.env.CLIENT_PORT ?? 4605),
    strictPort: true,
    proxy: { '/api': api, '/socket.io': { target: api, ws: true } },
  },
  build: {
    target: 'es2022',
    sourcemap: true,
    manifest: true,
    chunkSizeWarningLimit: 600,
    // Few files before the first page shows: a phone's line pays its latency for every six of them.
    rolldownOptions: {
      output: {
        codeSplitting: {
          groups: [
            { name: 'start', tags: ['$initial'], priority: 2 },
            {
              name: 'drawing',
              test: /client.src.(components.(cut-sketch|figure|countdown|status-word)|lib.format)/,
              priority: 1,
            },
          ],
        },
      },
    },
  },
  test: {
    name: 'client',
    environment: 'happy-dom',
    setupFiles: ['./src/test/setup.ts'],
    include: ['src/**/*.test.{ts,tsx}'],
    css: false,
  },
});
