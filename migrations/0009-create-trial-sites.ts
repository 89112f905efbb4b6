import { ID } from './columns';
import type { Migration } from './migration';

export const createTrialSites: Migration = {
  name: '0009-create-trial-sites',
  up: (context) =>
    context.query(`
      CREATE TABLE trial_sites (
        trial_id ${ID} NOT NULL,
        site_id ${ID} NOT NULL,
        state ENUM('planned', 'active', 'suspended', 'closed') NOT NULL,
        PRIMARY KEY (trial_id, site_id),
        FOREIGN KEY (trial_id) REFERENCES trials (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (site_id) REFERENCES sites (id) ON DELETE RESTRICT ON UPDATE RESTRICT
      )
    `),
};
