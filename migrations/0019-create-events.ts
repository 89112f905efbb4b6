import { ID, DIGEST, TIME } from './columns';
import type { Migration } from './migration';

export const createEvents: Migration = {
  name: '0019-create-events',
  up: (context) =>
    context.query(`
      CREATE TABLE events (
        id ${ID} PRIMARY KEY,
        chain VARCHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
        sequence INT UNSIGNED NOT NULL,
        occurred_at ${TIME} NOT NULL,
        person_id ${ID} NULL,
        role VARCHAR(20) CHARACTER SET ascii NOT NULL,
        kind VARCHAR(60) CHARACTER SET ascii NOT NULL,
        payload_digest ${DIGEST} NOT NULL,
        previous_hash ${DIGEST} NOT NULL,
        hash ${DIGEST} NOT NULL UNIQUE,
        UNIQUE KEY one_event_a_sequence (chain, sequence),
        FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT
      )
    `),
};
