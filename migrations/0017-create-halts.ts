import { ID, TIME } from './columns';
import type { Migration } from './migration';

export const createHalts: Migration = {
  name: '0017-create-halts',
  up: (context) =>
    context.query(`
      CREATE TABLE halts (
        id ${ID} PRIMARY KEY,
        trial_id ${ID} NOT NULL,
        halted_by ${ID} NULL,
        halted_at ${TIME} NOT NULL,
        reason VARCHAR(2000) NOT NULL,
        lifted_at ${TIME} NULL,
        standing_trial_id ${ID} AS (CASE WHEN lifted_at IS NULL THEN trial_id END) PERSISTENT,
        UNIQUE KEY one_halt_a_trial (standing_trial_id),
        FOREIGN KEY (trial_id) REFERENCES trials (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (halted_by) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT
      )
    `),
};
