import type { Migration } from './migration';

export const refuseUpdateOfEventPayloads: Migration = {
  name: '0023-refuse-update-of-event-payloads',
  up: (context) =>
    context.query(`
      CREATE TRIGGER event_payloads_refuse_update BEFORE UPDATE ON event_payloads FOR EACH ROW
        SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'The trail is append-only.'
    `),
};
