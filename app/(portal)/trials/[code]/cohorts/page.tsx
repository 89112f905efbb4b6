import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { Caution } from '@/components/caution/caution';
import { CohortTable } from '@/components/cohorts/cohort-table';
import { PageTitle } from '@/components/layout/page-title';
import { Sheet } from '@/components/layout/sheet';
import { EmptyState } from '@/components/ui/empty-state';
import { cohortList } from '@/lib/queries/trial/cohort-list';
import { requireReader } from '@/lib/server/session';

export const metadata: Metadata = { title: 'Cohorts' };

/** The cohorts of a trial: dose, state, how far each is. */
export default async function CohortsPage({ params }: PageProps<'/trials/[code]/cohorts'>) {
  const reader = await requireReader();
  const { code } = await params;
  const view = await cohortList(reader, code);
  if (view === null) notFound();
  return (
    <Sheet caution={<Caution />}>
      <PageTitle lede={view.cohorts.length > 0 ? view.follows : undefined}>Cohorts</PageTitle>
      {view.cohorts.length > 0 ? (
        <CohortTable trialCode={view.trialCode} cohorts={view.cohorts} presentLabel={view.presentLabel} />
      ) : (
        <EmptyState title="No dose is released yet">{view.follows}</EmptyState>
      )}
    </Sheet>
  );
}
