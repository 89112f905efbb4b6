import { DIGEST, TIME } from './columns';
import type { Migration } from './migration';

export const createInstallation: Migration = {
  name: '0005-create-installation',
  up: (context) =>
    context.query(`
      CREATE TABLE installation (
        id TINYINT UNSIGNED PRIMARY KEY CHECK (id = 1),
        kind ENUM('production', 'demo', 'test') NOT NULL,
        clock_offset_milliseconds BIGINT NOT NULL DEFAULT 0,
        version INT UNSIGNED NOT NULL DEFAULT 0,
        chain_sequence INT UNSIGNED NOT NULL DEFAULT 0,
        chain_head ${DIGEST} NOT NULL DEFAULT '',
        chain_time ${TIME} NULL,
        demo_loaded_at ${TIME} NULL,
        CONSTRAINT clock_offset_in_tests_only CHECK (kind = 'test' OR clock_offset_milliseconds = 0)
      )
    `),
};
