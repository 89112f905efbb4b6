import { ID, TIME } from './columns';
import type { Migration } from './migration';

export const createSubmissions: Migration = {
  name: '0025-create-submissions',
  up: (context) =>
    context.query(`
      CREATE TABLE submissions (
        person_id ${ID} NOT NULL,
        submission_key CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
        command VARCHAR(60) CHARACTER SET ascii NOT NULL,
        result LONGTEXT NOT NULL,
        created_at ${TIME} NOT NULL,
        PRIMARY KEY (person_id, submission_key),
        FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CHECK (JSON_VALID(result))
      )
    `),
};
