import { ID } from './columns';
import type { Migration } from './migration';

export const createMembershipSites: Migration = {
  name: '0011-create-membership-sites',
  up: (context) =>
    context.query(`
      CREATE TABLE membership_sites (
        membership_id ${ID} NOT NULL,
        site_id ${ID} NOT NULL,
        PRIMARY KEY (membership_id, site_id),
        FOREIGN KEY (membership_id) REFERENCES memberships (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
        FOREIGN KEY (site_id) REFERENCES sites (id) ON DELETE RESTRICT ON UPDATE RESTRICT
      )
    `),
};
