import { ID, DIGEST, TIME } from './columns';
import type { Migration } from './migration';

export const createTrials: Migration = {
  name: '0008-create-trials',
  up: (context) =>
    context.query(`
      CREATE TABLE trials (
        id ${ID} PRIMARY KEY,
        code VARCHAR(20) NOT NULL UNIQUE,
        title VARCHAR(200) NOT NULL,
        state ENUM('draft', 'in-review', 'open', 'halted', 'closed', 'locked') NOT NULL,
        quorum TINYINT UNSIGNED NOT NULL DEFAULT 2 CHECK (quorum BETWEEN 1 AND 9),
        version INT UNSIGNED NOT NULL DEFAULT 0,
        chain_sequence INT UNSIGNED NOT NULL DEFAULT 0,
        chain_head ${DIGEST} NOT NULL DEFAULT '',
        chain_time ${TIME} NULL,
        created_at ${TIME} NOT NULL
      )
    `),
};
