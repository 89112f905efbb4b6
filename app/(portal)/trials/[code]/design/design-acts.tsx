import { ApproveDesign, ReturnDesign, SubmitDesign } from '@/components/design/act-forms';
import { Section } from '@/components/layout/section';
import { Notice } from '@/components/ui/notice';
import type { DesignView, ShownDesign } from '@/lib/queries/trial/design';
import { approveDesign, returnDesign, submitDesign } from './actions';

/** The one act on the version shown: submitting the draft, or deciding on a submitted version. */
export function DesignActs({
  view,
  shown,
  printedName,
}: {
  view: DesignView;
  shown: ShownDesign;
  printedName: string;
}) {
  const { trialCode } = view;
  const { versionId } = shown;
  if (shown.submit) {
    return (
      <Section title="Submit for approval" raised>
        <p className="mb-3 max-w-prose">
          A safety reviewer who did not propose the design approves it by signature or returns it. While it is
          in review it cannot be changed. Who submits a design signs no step of the trial.
        </p>
        <SubmitDesign
          key={versionId}
          trialCode={trialCode}
          versionId={versionId}
          why={shown.submit.why}
          action={submitDesign}
        />
      </Section>
    );
  }
  if (!shown.approve && !shown.return) return null;
  return (
    <Section title="Your decision" raised id="decision">
      <div className="grid gap-5">
        <p className="max-w-prose">
          Approval computes the first recommendation, the starting dose, which then waits for the quorum’s
          signatures. Nothing is released by it.
        </p>
        {shown.approve?.why ? (
          <Notice kind="note" title="You may not approve this design" live={false}>
            {shown.approve.why}
          </Notice>
        ) : shown.approve ? (
          <ApproveDesign
            key={shown.digest}
            version={{ trialCode, versionId, seenDigest: shown.digest, number: shown.number }}
            printedName={printedName}
            meaning={shown.approvalMeaning}
            action={approveDesign}
          />
        ) : null}
        {shown.return ? (
          <div className="border-t border-line pt-4">
            <ReturnDesign key={versionId} trialCode={trialCode} versionId={versionId} action={returnDesign} />
          </div>
        ) : null}
      </div>
    </Section>
  );
}
