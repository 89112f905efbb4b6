import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { Caution } from '@/components/caution/caution';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { StaticTable } from '@/components/tables/static-table';
import { EmptyState } from '@/components/ui/empty-state';
import { ProportionSection } from '@/components/trial/proportion-section';
import { doseText } from '@/lib/design/dose-text';
import { SMALL_COUNT, summaryPage, type ToldCount } from '@/lib/queries/trial/summary';
import { requireReader } from '@/lib/server/session';

export const metadata: Metadata = { title: 'Summary' };

const count = (told: ToldCount): string =>
  told === null ? `fewer than ${SMALL_COUNT}, or held back` : String(told);

/** The summary of a trial for its sponsor: signed doses and aggregates alone. */
export default async function SummaryPage({ params }: { params: Promise<{ code: string }> }) {
  const reader = await requireReader();
  const view = await summaryPage(reader, (await params).code);
  if (view === null) notFound();
  const { design } = view;
  const current = view.cohorts.at(-1);
  return (
    <Sheet
      caution={<Caution />}
      margin={
        <MarginNote title="What is shown">
          <p>
            Doses that are signed, and counts. No subject’s record, no computation and no dose that waits for
            signatures is part of this page.
          </p>
          <p>Counts below {SMALL_COUNT} are held back, with another where one could be worked out.</p>
        </MarginNote>
      }
    >
      <PageTitle
        lede={
          design && current
            ? `${view.signedCohorts} of at most ${design.maximumCohorts} cohorts are signed; cohort ${current.number} is at ${doseText(design, current.dose)}.`
            : 'No dose is released yet.'
        }
      >
        Summary
      </PageTitle>
      {design === null || current === undefined ? (
        <EmptyState title="Nothing to summarise yet">
          The summary begins with the first signed dose.
        </EmptyState>
      ) : (
        <>
          <Section title="Signed doses">
            <StaticTable
              caption="Signed doses by cohort"
              columns={[
                { key: 'number', header: 'Cohort', rowHeader: true },
                { key: 'dose', header: 'Dose', strong: true },
                { key: 'released', header: 'Released', kind: 'day' },
                { key: 'state', header: 'Cohort is', kind: 'state' },
              ]}
              rows={view.cohorts.map((cohort) => ({
                id: String(cohort.number),
                values: {
                  number: cohort.number,
                  dose: doseText(design, cohort.dose),
                  released: cohort.releasedAt,
                  state: cohort.state,
                },
              }))}
            />
            {view.meanCohortDays === null ? null : (
              <p className="mt-3 text-sm text-ink-soft">
                A signed cohort took {view.meanCohortDays.toFixed(0)} days from its release to its last
                outcome, on average.
              </p>
            )}
          </Section>
          <ProportionSection
            design={design}
            proportions={view.proportions}
            from="signed cohorts"
            leftOut={
              view.dosesLeftOut > 0
                ? `${view.dosesLeftOut === 1 ? 'One dose has' : `${view.dosesLeftOut} doses have`} fewer than ${SMALL_COUNT} evaluable subjects and ${view.dosesLeftOut === 1 ? 'is' : 'are'} held back.`
                : null
            }
          />
          <Section title="Enrolment by site">
            <StaticTable
              caption="Subjects dosed, by site"
              columns={[
                { key: 'code', header: 'Site', kind: 'code', rowHeader: true },
                { key: 'name', header: 'Name' },
                { key: 'enrolled', header: 'Subjects dosed' },
              ]}
              rows={view.sites.map((site) => ({
                id: site.code,
                values: { code: site.code, name: site.name, enrolled: count(site.enrolled) },
              }))}
            />
            <p className="mt-3 text-sm text-ink-soft">All sites: {count(view.enrolled)} subjects dosed.</p>
          </Section>
        </>
      )}
    </Sheet>
  );
}
