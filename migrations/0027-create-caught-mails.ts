import type { Migration } from './migration';

export const createCaughtMails: Migration = {
  name: '0027-create-caught-mails',
  up: (context) =>
    context.query(`
      CREATE TABLE caught_mails (
        id BIGINT UNSIGNED AUTO_INCREMENT PRIMARY KEY,
        received_at DATETIME(6) NOT NULL,
        envelope_to TEXT NOT NULL,
        subject VARCHAR(500) NOT NULL,
        message_id VARCHAR(200) NOT NULL,
        text LONGTEXT NOT NULL,
        html LONGTEXT NOT NULL
      )
    `),
};
