import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import { ActForm } from '@/components/administration/act-form';
import { MailStateChip, mailStateWord } from '@/components/administration/state-chips';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { DataTable } from '@/components/tables/data-table';
import { Notice } from '@/components/ui/notice';
import {
  MAIL_STATES,
  mailIsHeld,
  type MailLine,
  mailList,
  type MailState,
  MOST_MAILS_LISTED,
} from '@/lib/queries/administration/mail';
import { LINK_MAIL_KINDS } from '@/lib/schemas/one-time-link';
import { requireInstallationReader } from '@/lib/server/session';
import { retryMail } from './actions';

export const metadata: Metadata = { title: 'Mail' };

const words = (kind: string): string => {
  const text = kind.replaceAll('-', ' ');
  return text.charAt(0).toUpperCase() + text.slice(1);
};

function RetryMail({ mail }: { mail: MailLine }) {
  if (LINK_MAIL_KINDS.some((kind) => kind === mail.kind)) {
    return (
      <span className="text-sm text-ink-soft">
        Its link was wiped; send a new one from the person’s page.
      </span>
    );
  }
  return (
    <ActForm
      act="retry-mail"
      values={{ mailId: mail.mailId }}
      action={retryMail}
      name={`Try the mail to ${mail.address} again`}
      label="Try again"
      pendingLabel="Queuing…"
      small
    />
  );
}

/** The outbox without its contents: what was sent to whom, what waits, and what was given up. */
export default async function MailPage({
  searchParams,
}: {
  searchParams: Promise<{ state?: string | string[] }>;
}) {
  const reader = await requireInstallationReader('mail.read');
  const asked = (await searchParams).state;
  const state = MAIL_STATES.find((each) => each === asked) ?? null;
  const { counts, mails } = await mailList(state);
  const all = Object.values(counts).reduce((sum, each) => sum + each, 0);
  const choices: { state: MailState | null; label: string }[] = [
    { state: null, label: `All (${all})` },
    ...MAIL_STATES.map((each) => ({ state: each, label: `${mailStateWord(each)} (${counts[each]})` })),
  ];
  return (
    <Sheet
      margin={
        <MarginNote title="What the states mean">
          <p>Waiting: to be sent, or tried again later.</p>
          <p>Sent: taken over by the mail server.</p>
          <p>
            Overtaken: its cause no longer held, so it was not sent; a dose letter after a halt, for example.
          </p>
          <p>Given up: refused by the mail server again and again.</p>
        </MarginNote>
      }
    >
      <PageTitle lede="Each mail is queued with the change it tells of, and sent at least once. What it says is its reader’s alone.">
        Mail
      </PageTitle>
      {mailIsHeld(reader.installationKind) ? (
        <div className="mb-5">
          <Notice kind="waiting" title="Mail is held" live={false}>
            No mail server is configured. Set SMTP_URL and start again; what waits is sent then.
          </Notice>
        </div>
      ) : null}
      <Section title={state === null ? 'All mail' : mailStateWord(state)}>
        <nav aria-label="State of the mail" className="mb-4 flex flex-wrap gap-x-5 gap-y-1">
          {choices.map((choice) => (
            <PageLink
              key={choice.label}
              href={
                choice.state === null ? '/administration/mail' : `/administration/mail?state=${choice.state}`
              }
              aria-current={choice.state === state ? 'page' : undefined}
              className={choice.state === state ? 'font-semibold text-ink' : 'text-water underline'}
            >
              {choice.label}
            </PageLink>
          ))}
        </nav>
        <DataTable
          caption="Mail"
          what="mails"
          columns={[
            { key: 'created', header: 'Queued', kind: 'time' },
            { key: 'kind', header: 'Kind', rowHeader: true },
            { key: 'address', header: 'To' },
            { key: 'state', header: 'State' },
            { key: 'attempts', header: 'Tries', kind: 'number' },
            {
              key: 'sent',
              header: 'Sent',
              kind: 'time',
              hiddenAtFirst: state !== null && state !== 'sent',
            },
            { key: 'next', header: 'Next try', kind: 'time', hiddenAtFirst: state !== 'queued' },
            {
              key: 'error',
              header: 'Last error',
              hiddenAtFirst: mails.every(({ lastError }) => lastError === null),
            },
            ...(mails.some((mail) => mail.state === 'dead')
              ? [{ key: 'acts' as const, header: 'Act', acts: true }]
              : []),
          ]}
          rows={mails.map((mail) => ({
            id: mail.mailId,
            values: {
              created: mail.createdAt,
              kind: words(mail.kind),
              address: mail.address,
              state: mailStateWord(mail.state),
              attempts: mail.attempts,
              sent: mail.sentAt,
              next: mail.nextAttemptAt,
              error: mail.lastError,
            },
            content: {
              state: <MailStateChip state={mail.state} />,
              acts: mail.state === 'dead' ? <RetryMail mail={mail} /> : <></>,
            },
          }))}
          empty={<p className="text-ink-soft">No mail in this state.</p>}
        />
        {mails.length === MOST_MAILS_LISTED ? (
          <p className="mt-3 text-sm text-ink-soft">The newest {MOST_MAILS_LISTED} are listed.</p>
        ) : null}
      </Section>
    </Sheet>
  );
}
