import { ID, DIGEST, TIME } from './columns';
import type { Migration } from './migration';

export const createOneTimeLinks: Migration = {
  name: '0003-create-one-time-links',
  up: (context) =>
    context.query(`
      CREATE TABLE one_time_links (
        token_digest ${DIGEST} PRIMARY KEY,
        purpose ENUM('first-administrator', 'invitation', 'password-reset') NOT NULL,
        person_id ${ID} NULL,
        created_at ${TIME} NOT NULL,
        expires_at ${TIME} NOT NULL,
        used_at ${TIME} NULL,
        FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CHECK ((purpose = 'first-administrator') = (person_id IS NULL))
      )
    `),
};
