import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import { Caution } from '@/components/caution/caution';
import { PageTitle } from '@/components/layout/page-title';
import { Sheet } from '@/components/layout/sheet';
import { DataTable } from '@/components/tables/data-table';
import { EmptyState } from '@/components/ui/empty-state';
import { readersTrials } from '@/lib/queries/today';
import { requireReader } from '@/lib/server/session';

export const metadata: Metadata = { title: 'Trials' };

/** The reader's trials. */
export default async function TrialsPage() {
  const reader = await requireReader();
  const trials = await readersTrials(reader);
  return (
    <Sheet caution={<Caution />}>
      <PageTitle lede="The trials you have a role in.">Trials</PageTitle>
      <DataTable
        caption="Trials you have a role in"
        what="trials"
        columns={[
          { key: 'code', header: 'Code', kind: 'code', rowHeader: true },
          { key: 'title', header: 'Title' },
          { key: 'state', header: 'State', kind: 'state' },
          { key: 'role', header: 'Your role' },
          { key: 'cohort', header: 'Cohort', kind: 'number' },
          { key: 'cohortState', header: 'Cohort is', kind: 'state' },
        ]}
        rows={trials.map((trial) => ({
          id: trial.code,
          values: {
            code: trial.code,
            title: trial.title,
            state: trial.state,
            role: trial.roleName,
            cohort: trial.cohortNumber,
            cohortState: trial.cohortState,
          },
          content: {
            code: <PageLink href={`/trials/${trial.code}`}>{trial.code}</PageLink>,
          },
        }))}
        empty={
          <EmptyState title="No trials yet">
            An administrator gives roles in trials; ask the one of your installation.
          </EmptyState>
        }
      />
    </Sheet>
  );
}
