import type { Migration } from './migration';

export const refuseUpdateOfEvents: Migration = {
  name: '0021-refuse-update-of-events',
  up: (context) =>
    context.query(`
      CREATE TRIGGER events_refuse_update BEFORE UPDATE ON events FOR EACH ROW
        SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'The trail is append-only.'
    `),
};
