import { ID, TIME, DOSE } from './columns';
import type { Migration } from './migration';

export const createReleases: Migration = {
  name: '0014-create-releases',
  up: (context) =>
    context.query(`
      CREATE TABLE releases (
        id ${ID} PRIMARY KEY,
        trial_id ${ID} NOT NULL,
        cohort_number SMALLINT UNSIGNED NOT NULL,
        recommendation_id ${ID} NOT NULL UNIQUE,
        recommended_dose ${DOSE} NOT NULL,
        dose ${DOSE} NOT NULL,
        released_at ${TIME} NOT NULL,
        UNIQUE KEY one_release_a_cohort (trial_id, cohort_number),
        UNIQUE KEY released_dose (id, dose),
        FOREIGN KEY (trial_id) REFERENCES trials (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CONSTRAINT release_of_a_recommended_dose FOREIGN KEY (recommendation_id, recommended_dose)
          REFERENCES recommendations (id, dose) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CONSTRAINT never_above_the_recommended_dose CHECK (dose <= recommended_dose)
      )
    `),
};
