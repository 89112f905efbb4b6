import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { z } from 'zod';
import { Caution } from '@/components/caution/caution';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { DataTable } from '@/components/tables/data-table';
import { Hash } from '@/components/ui/hash';
import { Notice } from '@/components/ui/notice';
import { PageLink } from '@/components/ui/page-link';
import { BREAK_WORDS } from '@/lib/conduct/chain';
import { trailPage } from '@/lib/queries/trial/trail';
import { requireReader } from '@/lib/server/session';

/** The page asked for; an address is typed by anyone, so what cannot be read is the first. */
const asked = z.coerce.number().int().min(1).max(1_000_000).catch(1);

export const metadata: Metadata = { title: 'Trail' };

/** Everything that was done in the trial, by whom and when, with the verdict on its chain. */
export default async function TrailPage({
  params,
  searchParams,
}: {
  params: Promise<{ code: string }>;
  searchParams: Promise<{ page?: string | string[] }>;
}) {
  const reader = await requireReader();
  const view = await trailPage(reader, (await params).code, asked.parse((await searchParams).page));
  if (view === null) notFound();
  return (
    <Sheet
      caution={<Caution />}
      margin={
        <MarginNote title="Record">
          <p>
            Each event is hashed over the one before it (SHA-256). Nothing here can be changed or deleted by
            the application.
          </p>
          <p>
            Head of the chain: <Hash value={view.head} />
          </p>
        </MarginNote>
      }
    >
      <PageTitle lede="Every change of state, who made it, in which role, when and why. Times are UTC.">
        Trail
      </PageTitle>
      {view.firstBreak ? (
        <Notice kind="error" title={`The chain is broken at event ${view.firstBreak.sequence}.`} live={false}>
          {BREAK_WORDS[view.firstBreak.reason]} Tell the administrator and the sponsor; do not go on as if
          nothing happened.
        </Notice>
      ) : (
        <Notice kind="saved" title="The chain is whole." live={false}>
          {view.count} events, verified from the first to the last as this page was made.
        </Notice>
      )}
      <Section title="Events">
        <DataTable
          caption="Events of the trial, newest first"
          what="events"
          csvName={`${view.code}-trail`}
          columns={[
            { key: 'sequence', header: 'No.', kind: 'number', rowHeader: true },
            { key: 'at', header: 'Time', kind: 'time' },
            { key: 'person', header: 'Who' },
            { key: 'role', header: 'Role' },
            { key: 'what', header: 'What' },
            { key: 'hash', header: 'Hash', kind: 'code', hiddenAtFirst: true },
          ]}
          rows={view.entries.map((entry) => ({
            id: String(entry.sequence),
            values: {
              sequence: entry.sequence,
              at: entry.occurredAt,
              person: entry.person,
              role: entry.role,
              what: entry.what,
              hash: entry.hash,
            },
          }))}
        />
        <nav aria-label="Newer and older events" className="mt-4 flex flex-wrap gap-6 print:hidden">
          {view.page > 1 ? (
            <PageLink href={`/trials/${view.code}/trail?page=${view.page - 1}`}>Newer</PageLink>
          ) : null}
          {view.pages > 1 ? (
            <span className="text-ink-soft">
              Page {view.page} of {view.pages}
            </span>
          ) : null}
          {view.page < view.pages ? (
            <PageLink href={`/trials/${view.code}/trail?page=${view.page + 1}`}>Older</PageLink>
          ) : null}
        </nav>
      </Section>
    </Sheet>
  );
}
