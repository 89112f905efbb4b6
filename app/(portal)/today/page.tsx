import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import { Caution } from '@/components/caution/caution';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { StateChip } from '@/components/ui/chip';
import { EmptyState } from '@/components/ui/empty-state';
import { TimeInZone } from '@/components/ui/time-in-zone';
import { today, type Waiting } from '@/lib/queries/today';
import { requireReader } from '@/lib/server/session';

export const metadata: Metadata = { title: 'Today' };

function WaitingLine({ line }: { line: Waiting }) {
  return (
    <li className="grid gap-x-4 gap-y-0.5 border-b border-line py-3 md:grid-cols-[7rem_minmax(0,1fr)_auto]">
      <span className="font-mono text-xs text-ink-soft">{line.trialCode}</span>
      <PageLink href={line.href} className="font-semibold">
        {line.what}
      </PageLink>
      <span className={line.isOverdue ? 'text-sm font-semibold text-ochre' : 'text-sm text-ink-soft'}>
        {line.at ? (
          <>
            {line.isOverdue ? 'due since ' : ''}
            <TimeInZone at={line.at} zone="UTC" />
          </>
        ) : null}
      </span>
    </li>
  );
}

/** What waits for the reader, in every trial of theirs. */
export default async function TodayPage() {
  const reader = await requireReader();
  const { waiting, trials } = await today(reader);
  return (
    <Sheet
      caution={<Caution />}
      margin={
        <MarginNote title="Your trials">
          {trials.length === 0 ? (
            <p>None yet.</p>
          ) : (
            <ul className="grid gap-2">
              {trials.map((trial) => (
                <li key={trial.code}>
                  <PageLink href={`/trials/${trial.code}`}>{trial.code}</PageLink>{' '}
                  <StateChip state={trial.state} />
                  <br />
                  {trial.roleName}
                </li>
              ))}
            </ul>
          )}
        </MarginNote>
      }
    >
      <PageTitle lede={leadOf(waiting.length, reader.isAdministrator)}>Today</PageTitle>
      {reader.isAdministrator ? (
        <Section title="The installation">
          <p>
            People, sites, trials and mail are under{' '}
            <PageLink href="/administration">Administration</PageLink>. No clinical data is shown to an
            administrator.
          </p>
        </Section>
      ) : null}
      {waiting.length > 0 ? (
        <Section title="Waiting for you">
          <ul>
            {waiting.map((line, index) => (
              <WaitingLine key={`${line.trialCode} ${index}`} line={line} />
            ))}
          </ul>
        </Section>
      ) : reader.isAdministrator ? null : (
        <EmptyState title="Nothing waits for you">
          You are told by e-mail as soon as something does.
        </EmptyState>
      )}
    </Sheet>
  );
}

function leadOf(count: number, isAdministrator: boolean): string {
  if (isAdministrator && count === 0)
    return 'The installation is yours to run; its trials are not yours to read.';
  if (count === 0) return 'All is done for now.';
  return count === 1 ? 'One thing waits for you.' : `${count} things wait for you.`;
}
