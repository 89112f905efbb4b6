import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import { notFound } from 'next/navigation';
import { RecipientFilter } from '@/components/caught-mail/recipient-filter';
import { PageTitle } from '@/components/layout/page-title';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { StaticTable } from '@/components/tables/static-table';
import { EmptyState } from '@/components/ui/empty-state';
import { caughtMails } from '@/lib/queries/caught-mails';
import { caughtMailFilterSchema, caughtMailListPath } from '@/lib/schemas/caught-mail-address';

export const metadata: Metadata = { title: 'Caught mail' };

interface Props {
  readonly searchParams: Promise<Record<string, string | string[] | undefined>>;
}

/** The mails a demonstration has sent: none leaves it, and anyone may read them here. */
export default async function CaughtMailPage({ searchParams }: Props) {
  const filter = caughtMailFilterSchema.parse(await searchParams);
  const list = await caughtMails(filter);
  if (list === null) notFound();
  return (
    <Sheet
      margin={
        <MarginNote title="Why here?">
          <p>
            This installation is a demonstration. Its mail is caught on this machine and goes to nobody;
            whoever opens this page reads all of it.
          </p>
        </MarginNote>
      }
    >
      <PageTitle lede="What this demonstration has mailed, the newest first.">Caught mail</PageTitle>
      <RecipientFilter recipients={list.recipients} chosen={filter.to} />
      <StaticTable
        caption="Caught mails"
        stacked
        columns={[
          { key: 'subject', header: 'Subject', rowHeader: true },
          { key: 'to', header: 'To' },
          { key: 'receivedAt', header: 'Caught', kind: 'time' },
        ]}
        rows={list.mails.map((mail) => ({
          id: String(mail.id),
          values: mail,
          content: {
            subject: <PageLink href={`/caught-mail/${mail.id}`}>{mail.subject || 'No subject'}</PageLink>,
          },
        }))}
        empty={
          <EmptyState title="No mail here yet.">
            {filter.to === null && filter.before === null
              ? 'A mail is caught a second or two after the act that causes it.'
              : 'No caught mail fits this choice.'}
          </EmptyState>
        }
      />
      <nav aria-label="Older and newer mails" className="mt-5 flex gap-6">
        {filter.before === null ? null : (
          <PageLink href={caughtMailListPath({ to: filter.to })}>Newest mails</PageLink>
        )}
        {list.olderThan === null ? null : (
          <PageLink href={caughtMailListPath({ to: filter.to, before: list.olderThan })}>
            Older mails
          </PageLink>
        )}
      </nav>
    </Sheet>
  );
}
