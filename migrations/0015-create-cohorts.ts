import { ID, TIME, DOSE } from './columns';
import type { Migration } from './migration';

export const createCohorts: Migration = {
  name: '0015-create-cohorts',
  up: (context) =>
    context.query(`
      CREATE TABLE cohorts (
        id ${ID} PRIMARY KEY,
        trial_id ${ID} NOT NULL,
        number SMALLINT UNSIGNED NOT NULL,
        size SMALLINT UNSIGNED NOT NULL CHECK (size >= 1),
        design_version_id ${ID} NOT NULL,
        release_id ${ID} NOT NULL UNIQUE,
        dose ${DOSE} NOT NULL,
        state ENUM('open', 'under-review', 'signed', 'cancelled') NOT NULL,
        is_records_only BOOLEAN NOT NULL DEFAULT FALSE,
        is_closed_short BOOLEAN NOT NULL DEFAULT FALSE,
        opened_at ${TIME} NOT NULL,
        completed_at ${TIME} NULL,
        open_trial_id ${ID} AS (CASE WHEN state IN ('open', 'under-review') THEN trial_id END) PERSISTENT,
        UNIQUE KEY one_cohort_a_number (trial_id, number),
        UNIQUE KEY one_unsigned_cohort_a_trial (open_trial_id),
        UNIQUE KEY cohort_size (id, size),
        FOREIGN KEY (trial_id) REFERENCES trials (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (design_version_id) REFERENCES design_versions (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CONSTRAINT cohort_at_its_released_dose FOREIGN KEY (release_id, dose)
          REFERENCES releases (id, dose) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CHECK (state = 'open' OR completed_at IS NOT NULL OR state = 'cancelled')
      )
    `),
};
