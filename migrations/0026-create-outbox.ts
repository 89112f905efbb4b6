import { ID, TIME } from './columns';
import type { Migration } from './migration';

export const createOutbox: Migration = {
  name: '0026-create-outbox',
  up: (context) =>
    context.query(`
      CREATE TABLE outbox (
        id ${ID} PRIMARY KEY,
        kind VARCHAR(60) CHARACTER SET ascii NOT NULL,
        cause VARCHAR(120) CHARACTER SET ascii NOT NULL,
        person_id ${ID} NULL,
        address VARCHAR(254) NOT NULL,
        payload LONGTEXT NOT NULL,
        priority TINYINT UNSIGNED NOT NULL,
        state ENUM('queued', 'sent', 'overtaken', 'dead') NOT NULL,
        attempts INT UNSIGNED NOT NULL DEFAULT 0,
        lease_owner VARCHAR(80) NULL,
        lease_until DATETIME(6) NULL,
        next_attempt_at DATETIME(6) NULL,
        message_id VARCHAR(200) CHARACTER SET ascii NOT NULL UNIQUE,
        last_error VARCHAR(500) NULL,
        created_at ${TIME} NOT NULL,
        sent_at ${TIME} NULL,
        UNIQUE KEY once_per_cause_and_recipient (kind, cause, address),
        INDEX outbox_to_send (state, priority, next_attempt_at),
        FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CHECK (JSON_VALID(payload))
      )
    `),
};
