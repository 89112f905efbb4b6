import type { Migration } from './migration';

export const refuseDeleteOfEvents: Migration = {
  name: '0022-refuse-delete-of-events',
  up: (context) =>
    context.query(`
      CREATE TRIGGER events_refuse_delete BEFORE DELETE ON events FOR EACH ROW
        SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'The trail is append-only.'
    `),
};
