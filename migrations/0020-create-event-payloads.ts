import { ID } from './columns';
import type { Migration } from './migration';

export const createEventPayloads: Migration = {
  name: '0020-create-event-payloads',
  up: (context) =>
    context.query(`
      CREATE TABLE event_payloads (
        event_id ${ID} PRIMARY KEY,
        schema_version SMALLINT UNSIGNED NOT NULL,
        salt CHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
        payload LONGTEXT NOT NULL,
        FOREIGN KEY (event_id) REFERENCES events (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CHECK (JSON_VALID(payload))
      )
    `),
};
