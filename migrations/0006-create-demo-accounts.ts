import { ID } from './columns';
import type { Migration } from './migration';

export const createDemoAccounts: Migration = {
  name: '0006-create-demo-accounts',
  up: (context) =>
    context.query(`
      CREATE TABLE demo_accounts (
        person_id ${ID} PRIMARY KEY,
        password VARCHAR(120) NOT NULL,
        description VARCHAR(200) NOT NULL,
        position SMALLINT UNSIGNED NOT NULL,
        FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE RESTRICT ON UPDATE RESTRICT
      )
    `),
};
