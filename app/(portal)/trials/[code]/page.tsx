import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import { notFound, redirect } from 'next/navigation';
import { Caution } from '@/components/caution/caution';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { ProportionSection } from '@/components/trial/proportion-section';
import { DefinitionList } from '@/components/ui/definition-list';
import { doseText } from '@/lib/design/dose-text';
import { type OverviewView, overviewPage } from '@/lib/queries/trial/overview';
import { mayInTrialByCode } from '@/lib/queries/trial/reader-trial';
import { requireReader } from '@/lib/server/session';

export const metadata: Metadata = { title: 'Overview' };

/** Where the trial stands. A sponsor's first page is the summary. */
export default async function OverviewPage({ params }: { params: Promise<{ code: string }> }) {
  const reader = await requireReader();
  const { code } = await params;
  const view = await overviewPage(reader, code);
  if (view === null) {
    if (await mayInTrialByCode(reader, code, 'summary.read')) redirect(`/trials/${code}/summary`);
    notFound();
  }
  return (
    <Sheet caution={<Caution />} margin={<OverviewMargin view={view} />}>
      <PageTitle lede={ledeOf(view)}>Overview</PageTitle>
      <Section title="Where it stands">
        <Standing view={view} />
      </Section>
      {view.proportions && view.design && view.proportions.length > 0 ? (
        <ProportionSection design={view.design} proportions={view.proportions} from="complete cohorts" />
      ) : null}
    </Sheet>
  );
}

function ledeOf({ state, cohort, design }: OverviewView): string {
  if (state === 'draft') return 'The design is being written.';
  if (state === 'in-review') return 'The design is in review. The first dose is not released yet.';
  if (state === 'closed') return 'The trial is closed to enrolment.';
  if (!cohort || !design) return 'No cohort is open.';
  if (cohort.state === 'under-review') return `Cohort ${cohort.number} is under review.`;
  return `Cohort ${cohort.number} is open at ${doseText(design, cohort.dose)}.`;
}

function Standing({ view }: { view: OverviewView }) {
  const { cohort, design } = view;
  const items = [
    {
      term: 'Cohorts signed',
      detail: `${view.signedCohorts}${design ? ` of at most ${design.maximumCohorts}` : ''}`,
    },
    ...(cohort && design
      ? [
          { term: `Dose of cohort ${cohort.number}`, detail: doseText(design, cohort.dose) },
          { term: 'Places taken', detail: `${cohort.taken} of ${cohort.size}` },
          { term: 'Outcomes recorded', detail: `${cohort.outcomes} of ${cohort.size}` },
        ]
      : []),
    ...(design
      ? [
          { term: 'Target', detail: `${design.target} ${design.response.present}` },
          {
            term: 'Observation window',
            detail: `${design.observationWindow.length} ${design.observationWindow.unit}`,
          },
          { term: 'Design version', detail: String(view.designVersion) },
        ]
      : []),
  ];
  return <DefinitionList items={items} />;
}

function OverviewMargin({ view }: { view: OverviewView }) {
  const base = `/trials/${view.code}`;
  const { cohort } = view;
  return (
    <MarginNote title="What next">
      {view.roleActs === 'records' && cohort ? (
        <p>
          <PageLink href={`${base}/cohorts/${cohort.number}`}>Open cohort {cohort.number}</PageLink>: places,
          dosing and outcomes of your site.
        </p>
      ) : null}
      {view.roleActs === 'signs' ? (
        <p>
          <PageLink href={`${base}/review`}>Review</PageLink> shows what waits for signatures.
        </p>
      ) : null}
      {view.roleActs === 'designs' ? (
        <p>
          <PageLink href={`${base}/design`}>Design</PageLink> shows the rule and its settings.
        </p>
      ) : null}
      {view.roleActs === 'reads' ? (
        <p>
          <PageLink href={`${base}/trail`}>Trail</PageLink> holds everything that was done.
        </p>
      ) : null}
    </MarginNote>
  );
}
