import { ID, TIME, DOSE } from './columns';
import type { Migration } from './migration';

export const createSubjects: Migration = {
  name: '0016-create-subjects',
  up: (context) =>
    context.query(`
      CREATE TABLE subjects (
        id ${ID} PRIMARY KEY,
        trial_id ${ID} NOT NULL,
        cohort_id ${ID} NOT NULL,
        cohort_size SMALLINT UNSIGNED NOT NULL,
        place SMALLINT UNSIGNED NULL,
        site_id ${ID} NOT NULL,
        code VARCHAR(24) NOT NULL,
        state ENUM('reserved', 'dosed', 'complete', 'released', 'cancelled') NOT NULL,
        reserved_by ${ID} NOT NULL,
        reserved_at ${TIME} NOT NULL,
        release_reason VARCHAR(500) NULL,
        dosed_at ${TIME} NULL,
        dose_given ${DOSE} NULL,
        deviation_reason VARCHAR(500) NULL,
        window_ends_at ${TIME} NULL,
        dosing_recorded_by ${ID} NULL,
        dosing_recorded_at ${TIME} NULL,
        outcome ENUM('present', 'absent', 'not-evaluable') NULL,
        onset_at ${TIME} NULL,
        grade TINYINT UNSIGNED NULL CHECK (grade BETWEEN 1 AND 5),
        outcome_recorded_by ${ID} NULL,
        outcome_recorded_at ${TIME} NULL,
        revision SMALLINT UNSIGNED NOT NULL DEFAULT 1,
        code_in_use VARCHAR(24) AS (CASE WHEN place IS NOT NULL THEN code END) PERSISTENT,
        UNIQUE KEY one_subject_a_place (cohort_id, place),
        UNIQUE KEY one_subject_a_code (trial_id, code_in_use),
        FOREIGN KEY (trial_id) REFERENCES trials (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (trial_id, site_id) REFERENCES trial_sites (trial_id, site_id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CONSTRAINT place_in_its_cohort FOREIGN KEY (cohort_id, cohort_size)
          REFERENCES cohorts (id, size) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (reserved_by) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (dosing_recorded_by) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (outcome_recorded_by) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CONSTRAINT never_more_subjects_than_places CHECK (place IS NULL OR place BETWEEN 1 AND cohort_size),
        CONSTRAINT a_place_while_it_is_held CHECK ((state IN ('released', 'cancelled')) = (place IS NULL)),
        CONSTRAINT dosing_is_whole CHECK (
          (state IN ('dosed', 'complete')) =
          (dosed_at IS NOT NULL AND dose_given IS NOT NULL AND window_ends_at IS NOT NULL)),
        CONSTRAINT outcome_is_whole CHECK ((state = 'complete') = (outcome IS NOT NULL)),
        CONSTRAINT onset_inside_the_window CHECK (
          outcome <> 'present' OR (onset_at IS NOT NULL AND onset_at >= dosed_at AND onset_at <= window_ends_at))
      )
    `),
};
