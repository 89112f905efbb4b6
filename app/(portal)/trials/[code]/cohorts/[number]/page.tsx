import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import { notFound } from 'next/navigation';
import { Caution } from '@/components/caution/caution';
import { ChangeWatch } from '@/components/cohorts/change-watch';
import type { CohortWork } from '@/components/cohorts/cohort-data';
import { LoadedResubmitForm } from '@/components/cohorts/loaded-forms';
import { PlaceList } from '@/components/cohorts/place-list';
import { ReleasedDose } from '@/components/cohorts/released-dose';
import { SavedNotice, SavedNoticeProvider } from '@/components/cohorts/saved-notice';
import { SubjectTable } from '@/components/cohorts/subject-table';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { StateChip } from '@/components/ui/chip';
import { EmptyState } from '@/components/ui/empty-state';
import { Notice } from '@/components/ui/notice';
import { OutcomeLegend } from '@/components/ui/outcome-mark';
import { type CohortPageView, cohortPage } from '@/lib/queries/trial/cohort-page';
import { requireReader } from '@/lib/server/session';
import {
  correctOutcome,
  recordDosing,
  recordOutcome,
  releaseSlot,
  reserveSlot,
  resubmitCohort,
} from './actions';

const actions = { reserveSlot, releaseSlot, recordDosing, recordOutcome, correctOutcome, resubmitCohort };

type Props = PageProps<'/trials/[code]/cohorts/[number]'>;

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { number } = await params;
  return { title: `Cohort ${number}` };
}

function Around({ view }: { view: CohortPageView }) {
  const { cohort, window, labels, givenBack } = view;
  const length = `${window.length} ${window.length === 1 ? window.unit.slice(0, -1) : window.unit}`;
  const base = `/trials/${view.trialCode}/cohorts`;
  return (
    <>
      <MarginNote title="Observation window">
        <p>{length} from dosing.</p>
        <p>
          “{labels.present}” can be recorded at any time with an onset inside the window, “{labels.absent}”
          once the window has ended.
        </p>
      </MarginNote>
      {givenBack.length > 0 ? (
        <MarginNote title="Places given back">
          <ul className="grid gap-1.5">
            {givenBack.map((each) => (
              <li key={each.id}>
                <code className="text-ink">{each.code}</code>, {each.siteName}:{' '}
                {each.reason ?? 'cancelled when the cohort was closed short.'}
              </li>
            ))}
          </ul>
        </MarginNote>
      ) : null}
      <MarginNote title="Other cohorts">
        <ul className="grid gap-1">
          {cohort.hasPrevious ? (
            <li>
              <PageLink href={`${base}/${cohort.number - 1}`}>Cohort {cohort.number - 1}</PageLink>
            </li>
          ) : null}
          {cohort.hasNext ? (
            <li>
              <PageLink href={`${base}/${cohort.number + 1}`}>Cohort {cohort.number + 1}</PageLink>
            </li>
          ) : null}
          <li>
            <PageLink href={base}>All cohorts</PageLink>
          </li>
        </ul>
      </MarginNote>
    </>
  );
}

/** A site's work on a cohort, or the whole of it to read. */
function Records({ view, work }: { view: CohortPageView; work: CohortWork }) {
  const { cohort, labels } = view;
  const places = `${cohort.placesTaken} of ${cohort.size} places taken`;
  if (view.reads === 'own-sites') {
    return (
      <Section title="Places" aside={<span className="text-sm text-ink-soft">{places}</span>}>
        <PlaceList
          work={work}
          cohortId={cohort.id}
          places={view.places}
          reserve={view.reserve}
          isOpen={cohort.standing.state === 'open'}
          actions={actions}
        />
      </Section>
    );
  }
  return (
    <Section title="Subjects" aside={<span className="text-sm text-ink-soft">{places}</span>}>
      {view.subjects.length > 0 ? (
        <>
          <SubjectTable
            work={work}
            caption={`Subjects of cohort ${cohort.number}`}
            subjects={view.subjects}
          />
          <div className="mt-3">
            <OutcomeLegend labels={labels} also={['pending']} />
          </div>
        </>
      ) : (
        <EmptyState title="No place is taken yet">
          The sites reserve places in this cohort; their subjects then stand here.
        </EmptyState>
      )}
    </Section>
  );
}

/** One cohort: its released dose, its places, and for its sites the next act on each of their subjects. */
export default async function CohortPage({ params }: Props) {
  const reader = await requireReader();
  const { code, number } = await params;
  const view = await cohortPage(reader, code, number);
  if (view === null) notFound();
  const { cohort, dose, zone } = view;
  const { readAt, labels, trialCode } = view;
  const work: CohortWork = { trialCode, cohortNumber: cohort.number, dose, labels, readAt };
  return (
    <Sheet caution={<Caution />} margin={<Around view={view} />}>
      <ChangeWatch trialCode={view.trialCode} cohortNumber={cohort.number} revision={view.revision} />
      <PageTitle lede={view.follows}>
        <span className="flex flex-wrap items-center gap-x-3.5 gap-y-1">
          Cohort {cohort.number} <StateChip {...cohort.standing} />
        </span>
      </PageTitle>
      <ReleasedDose dose={dose} zone={zone} notForDosing={view.notForDosing} />
      <SavedNoticeProvider>
        <SavedNotice spot="cohort" />
        {view.questions.length > 0 ? (
          <div className="mb-5">
            <Notice kind="waiting" title="The safety reviewers ask" live={false}>
              {view.questions.map((question) => (
                <p key={question} className="whitespace-pre-line">
                  {question}
                </p>
              ))}
            </Notice>
          </div>
        ) : null}
        <Records view={view} work={work} />
        {view.reads === 'own-sites' && view.resubmit ? (
          <Section title="Resubmit" raised>
            <LoadedResubmitForm
              trialCode={view.trialCode}
              cohortId={cohort.id}
              cohortNumber={cohort.number}
              action={actions.resubmitCohort}
              why={view.resubmit.why}
            />
          </Section>
        ) : null}
      </SavedNoticeProvider>
    </Sheet>
  );
}
