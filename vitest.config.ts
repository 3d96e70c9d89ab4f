import path from 'node:path';
import { defineConfig } from 'vitest/config';

export default defineConfig({
  resolve: { alias: { '~': path.resolve('src') } },
  test: {
    include: ['tests/{unit,reference,integration,architecture}/**/*.test.ts'],
    env: { LOG_LEVEL: process.env['LOG_LEVEL'] ?? 'silent' },
    testTimeout: 30_000,
    hookTimeout: 30_000,
    maxWorkers: 2,
    // It is published as TypeScript.
    server: { deps: { inline: ['auth-astro'] } },
  },
});
