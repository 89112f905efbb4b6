import { defineConfig } from 'vitest/config';
import { ALIASES } from './tests/setup/vitest-shared';

/** Journeys in a browser through the production build, one after another: they share one installation. */
export default defineConfig({
  resolve: { alias: ALIASES },
  test: {
    name: 'browser',
    environment: 'node',
    include: ['tests/e2e/**/*.e2e.ts'],
    globalSetup: ['tests/setup/browser-server.ts'],
    pool: 'forks',
    fileParallelism: false,
    testTimeout: 600_000,
    bail: process.env.CI ? 0 : 1,
    hookTimeout: 120_000,
    env: { STEPWELL_LOG_LEVEL: process.env.STEPWELL_LOG_LEVEL ?? 'silent' },
  },
});
