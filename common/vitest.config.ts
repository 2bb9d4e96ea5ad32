import { defineConfig } from 'vitest/config';

export default defineConfig({
  resolve: { conditions: ['@kerfyard/source'] },
  ssr: { resolve: { conditions: ['@kerfyard/source'] } },
  test: { name: 'common', environment: 'node', include: ['src/**/*.test.ts'] },
});
