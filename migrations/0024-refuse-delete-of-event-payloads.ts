import type { Migration } from './migration';

export const refuseDeleteOfEventPayloads: Migration = {
  name: '0024-refuse-delete-of-event-payloads',
  up: (context) =>
    context.query(`
      CREATE TRIGGER event_payloads_refuse_delete BEFORE DELETE ON event_payloads FOR EACH ROW
        SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'The trail is append-only.'
    `),
};
