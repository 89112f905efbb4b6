import { ID, TIME } from './columns';
import type { Migration } from './migration';

export const createMemberships: Migration = {
  name: '0010-create-memberships',
  up: (context) =>
    context.query(`
      CREATE TABLE memberships (
        id ${ID} PRIMARY KEY,
        trial_id ${ID} NOT NULL,
        person_id ${ID} NOT NULL,
        role ENUM('coordinator', 'investigator', 'reviewer', 'statistician', 'sponsor', 'monitor') NOT NULL,
        granted_at ${TIME} NOT NULL,
        ended_at ${TIME} NULL,
        has_recorded_data BOOLEAN NOT NULL DEFAULT FALSE,
        UNIQUE KEY one_role_a_person_and_trial (trial_id, person_id),
        FOREIGN KEY (trial_id) REFERENCES trials (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT
      )
    `),
};
