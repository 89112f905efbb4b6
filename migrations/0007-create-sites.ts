import { ID, TIME } from './columns';
import type { Migration } from './migration';

export const createSites: Migration = {
  name: '0007-create-sites',
  up: (context) =>
    context.query(`
      CREATE TABLE sites (
        id ${ID} PRIMARY KEY,
        code VARCHAR(12) NOT NULL UNIQUE,
        name VARCHAR(120) NOT NULL,
        time_zone VARCHAR(64) NOT NULL,
        created_at ${TIME} NOT NULL
      )
    `),
};
