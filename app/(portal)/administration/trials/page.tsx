import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import { candidateChoices } from '@/components/administration/candidate-choices';
import { TrialForm } from '@/components/administration/trial-form';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { Sheet } from '@/components/layout/sheet';
import { DataTable } from '@/components/tables/data-table';
import { EmptyState } from '@/components/ui/empty-state';
import { candidates, trialList } from '@/lib/queries/administration/trials';
import { requireInstallationReader } from '@/lib/server/session';
import { createTrial } from './actions';

export const metadata: Metadata = { title: 'Trials' };

/** Every trial with its team, and the making of another. */
export default async function TrialsPage() {
  await requireInstallationReader('trials.create');
  const [trials, people] = await Promise.all([trialList(), candidates()]);
  return (
    <Sheet>
      <PageTitle lede="A trial begins in draft, with the statistician you name; its design is theirs, its team yours.">
        Trials
      </PageTitle>
      <Section title="All trials">
        <DataTable
          caption="Trials"
          what="trials"
          columns={[
            { key: 'code', header: 'Code', kind: 'code', rowHeader: true },
            { key: 'title', header: 'Title' },
            { key: 'state', header: 'State', kind: 'state' },
            { key: 'members', header: 'Team', kind: 'number' },
            { key: 'sites', header: 'Sites', kind: 'number' },
            { key: 'created', header: 'Since', kind: 'day' },
          ]}
          rows={trials.map((trial) => ({
            id: trial.code,
            values: {
              code: trial.code,
              title: trial.title,
              state: trial.state,
              members: trial.members,
              sites: trial.sites,
              created: trial.createdAt,
            },
            content: {
              code: <PageLink href={`/administration/trials/${trial.code}`}>{trial.code}</PageLink>,
            },
          }))}
          empty={<EmptyState title="No trial yet">Create the first one below.</EmptyState>}
        />
      </Section>
      <Section title="Create a trial" raised>
        {people.length === 0 ? (
          <p className="max-w-prose">
            A trial needs a statistician, and there is nobody to choose yet.{' '}
            <PageLink href="/administration/people#invite">Invite a person</PageLink> who is no administrator
            first.
          </p>
        ) : (
          <TrialForm people={candidateChoices(people)} action={createTrial} />
        )}
      </Section>
    </Sheet>
  );
}
