import { ID, TIME } from './columns';
import type { Migration } from './migration';

export const createPeople: Migration = {
  name: '0001-create-people',
  up: (context) =>
    context.query(`
      CREATE TABLE people (
        id ${ID} PRIMARY KEY,
        email VARCHAR(254) NOT NULL UNIQUE,
        printed_name VARCHAR(120) NOT NULL,
        password_hash VARCHAR(255) NULL,
        state ENUM('invited', 'active', 'disabled') NOT NULL,
        is_administrator BOOLEAN NOT NULL DEFAULT FALSE,
        created_at ${TIME} NOT NULL,
        CHECK (state <> 'active' OR password_hash IS NOT NULL)
      )
    `),
};
