import { ID, DIGEST, TIME } from './columns';
import type { Migration } from './migration';

export const createDesignVersions: Migration = {
  name: '0012-create-design-versions',
  up: (context) =>
    context.query(`
      CREATE TABLE design_versions (
        id ${ID} PRIMARY KEY,
        trial_id ${ID} NOT NULL,
        number SMALLINT UNSIGNED NOT NULL,
        state ENUM('draft', 'submitted', 'approved') NOT NULL,
        design LONGTEXT NOT NULL,
        digest ${DIGEST} NOT NULL,
        proposed_by ${ID} NOT NULL,
        saved_at ${TIME} NOT NULL,
        submitted_at ${TIME} NULL,
        approved_at ${TIME} NULL,
        returned_reason VARCHAR(2000) NULL,
        UNIQUE KEY one_version_a_number (trial_id, number),
        FOREIGN KEY (trial_id) REFERENCES trials (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (proposed_by) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        CHECK (state = 'draft' OR submitted_at IS NOT NULL),
        CHECK ((state = 'approved') = (approved_at IS NOT NULL)),
        CHECK (JSON_VALID(design))
      )
    `),
};
