import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { LoadedLiftForm } from '@/components/review/lift-form-loaded';
import { Notice } from '@/components/ui/notice';
import { TimeInZone } from '@/components/ui/time-in-zone';
import type { LiftView, ReviewView } from '@/lib/queries/trial/review';
import { signLift } from './actions';

/** The halt that stands, and its lifting by the quorum. */
export function Lift({
  view,
  trial,
  printedName,
}: {
  view: LiftView;
  trial: ReviewView;
  printedName: string;
}) {
  return (
    <>
      <PageTitle
        lede={
          <>
            {view.haltedBy ?? 'The server'} halted the trial on <TimeInZone at={view.haltedAt} zone="UTC" />:{' '}
            {view.reason}
          </>
        }
      >
        Lift the halt?
      </PageTitle>
      <Section title="What a halt means">
        <ul className="list-disc pl-5">
          <li>Nobody is reserved or dosed, and no dose is released.</li>
          <li>Outcomes and corrections go on being recorded.</li>
          <li>Signatures on a waiting packet have lapsed; it is computed anew when the halt is lifted.</li>
        </ul>
      </Section>
      <Section title="Your decision" raised>
        {view.sign === null ? (
          <p>Safety reviewers of the trial sign the lifting; {trial.quorum} are needed.</p>
        ) : view.sign.why ? (
          <Notice kind="note" live={false}>
            {view.sign.why}
          </Notice>
        ) : (
          <LoadedLiftForm
            trialCode={trial.trialCode}
            haltId={view.haltId}
            cohortNumber={view.cohortNumber}
            printedName={printedName}
            standing={view.standing}
            quorum={trial.quorum}
            action={signLift}
          />
        )}
      </Section>
    </>
  );
}
