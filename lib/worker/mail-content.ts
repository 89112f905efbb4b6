import { renderMail } from '@/emails/registry';
import { models } from '../db/connection';
import { environment } from '../env';
import { causeStillHolds } from '../queries/cause-still-holds';
import type { MailDelivery } from './deliver-mail';

/** What a claimed mail says and whether it still is to be said: its kind, its payload and its reader decide. */
export const mailContent: Pick<MailDelivery, 'render' | 'stillHolds'> = {
  async render({ kind, payload, personId }) {
    const person = personId === null ? null : await models().Person.findByPk(personId);
    return renderMail(kind, JSON.parse(payload), {
      url: environment().url,
      recipientName: person?.printedName ?? null,
    });
  },
  stillHolds: ({ kind, payload, personId }) =>
    causeStillHolds({ kind, personId, payload: JSON.parse(payload) }),
};
