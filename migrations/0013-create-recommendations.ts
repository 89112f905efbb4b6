import { ID, DIGEST, TIME, DOSE } from './columns';
import type { Migration } from './migration';

export const createRecommendations: Migration = {
  name: '0013-create-recommendations',
  up: (context) =>
    context.query(`
      CREATE TABLE recommendations (
        id ${ID} PRIMARY KEY,
        trial_id ${ID} NOT NULL,
        number SMALLINT UNSIGNED NOT NULL,
        revision SMALLINT UNSIGNED NOT NULL,
        design_version_id ${ID} NOT NULL,
        outcome ENUM('dose', 'stop') NOT NULL,
        dose ${DOSE} NULL,
        closed_from ${DOSE} NULL,
        state ENUM('awaiting', 'released', 'stopped', 'returned', 'superseded', 'overtaken') NOT NULL,
        record LONGTEXT NOT NULL,
        digest ${DIGEST} NOT NULL,
        software_version VARCHAR(60) NOT NULL,
        computed_at ${TIME} NOT NULL,
        awaiting_trial_id ${ID} AS (CASE WHEN state = 'awaiting' THEN trial_id END) PERSISTENT,
        UNIQUE KEY one_revision (trial_id, number, revision),
        UNIQUE KEY one_awaiting_a_trial (awaiting_trial_id),
        UNIQUE KEY recommended_dose (id, dose),
        FOREIGN KEY (trial_id) REFERENCES trials (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (design_version_id) REFERENCES design_versions (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CHECK ((outcome = 'dose') = (dose IS NOT NULL)),
        CHECK (state <> 'released' OR outcome = 'dose'),
        CHECK (JSON_VALID(record))
      )
    `),
};
