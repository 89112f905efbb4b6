import { defineConfig } from 'vitest/config';
import { ALIASES } from './tests/setup/vitest-shared';

/** Tests against a real MariaDB: each file in a process of its own, with a database of its own. */
export default defineConfig({
  resolve: { alias: ALIASES },
  test: {
    name: 'database',
    environment: 'node',
    include: ['tests/database/**/*.test.ts'],
    globalSetup: ['tests/setup/database-server.ts'],
    pool: 'forks',
    maxWorkers: 2,
    testTimeout: 30_000,
    hookTimeout: 60_000,
    env: { STEPWELL_LOG_LEVEL: process.env.STEPWELL_LOG_LEVEL ?? 'silent' },
  },
});
