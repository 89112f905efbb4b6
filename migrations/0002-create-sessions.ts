import { ID, DIGEST, TIME } from './columns';
import type { Migration } from './migration';

export const createSessions: Migration = {
  name: '0002-create-sessions',
  up: (context) =>
    context.query(`
      CREATE TABLE sessions (
        id ${DIGEST} PRIMARY KEY,
        person_id ${ID} NOT NULL,
        created_at ${TIME} NOT NULL,
        last_seen_at ${TIME} NOT NULL,
        expires_at ${TIME} NOT NULL,
        ended_at ${TIME} NULL,
        FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT
      )
    `),
};
