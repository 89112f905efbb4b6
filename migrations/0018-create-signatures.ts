import { ID, DIGEST, TIME, DOSE } from './columns';
import type { Migration } from './migration';

export const createSignatures: Migration = {
  name: '0018-create-signatures',
  up: (context) =>
    context.query(`
      CREATE TABLE signatures (
        id ${ID} PRIMARY KEY,
        trial_id ${ID} NOT NULL,
        recommendation_id ${ID} NULL,
        design_version_id ${ID} NULL,
        halt_id ${ID} NULL,
        person_id ${ID} NOT NULL,
        printed_name VARCHAR(120) NOT NULL,
        decision ENUM('release', 'return', 'stop', 'approve', 'continue', 'close-short') NOT NULL,
        dose ${DOSE} NULL,
        reason VARCHAR(2000) NULL,
        meaning VARCHAR(500) NOT NULL,
        signed_text LONGTEXT NOT NULL,
        digest ${DIGEST} NOT NULL,
        signed_at ${TIME} NOT NULL,
        is_standing BOOLEAN NOT NULL,
        standing_subject_id ${ID} AS (
          CASE WHEN is_standing THEN COALESCE(recommendation_id, design_version_id, halt_id) END) PERSISTENT,
        UNIQUE KEY one_standing_signature_a_signer (standing_subject_id, person_id),
        FOREIGN KEY (trial_id) REFERENCES trials (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (recommendation_id) REFERENCES recommendations (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (design_version_id) REFERENCES design_versions (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (halt_id) REFERENCES halts (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CONSTRAINT signs_one_thing CHECK (
          (recommendation_id IS NOT NULL) + (design_version_id IS NOT NULL) + (halt_id IS NOT NULL) = 1),
        CONSTRAINT release_names_a_dose CHECK ((decision = 'release') = (dose IS NOT NULL))
      )
    `),
};
