import { DIGEST, TIME } from './columns';
import type { Migration } from './migration';

export const createSignInAttempts: Migration = {
  name: '0004-create-sign-in-attempts',
  up: (context) =>
    context.query(`
      CREATE TABLE sign_in_attempts (
        id BIGINT UNSIGNED AUTO_INCREMENT PRIMARY KEY,
        email_digest ${DIGEST} NOT NULL,
        client_address VARCHAR(64) NOT NULL,
        purpose ENUM('sign-in', 'signature') NOT NULL,
        succeeded BOOLEAN NOT NULL,
        attempted_at ${TIME} NOT NULL,
        INDEX sign_in_attempts_by_email (email_digest, attempted_at),
        INDEX sign_in_attempts_by_client (client_address, attempted_at)
      )
    `),
};
