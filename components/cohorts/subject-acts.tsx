'use client';

import { useState } from 'react';
import { ActDisclosure } from './act-disclosure';
import type { CohortActions, CohortWork, OwnSubjectData } from './cohort-data';
import { CorrectionForm } from './correction-form';
import { DosingForm } from './dosing-form';
import { OutcomeForm } from './outcome-form';
import { whyNotAbsent } from './outcome-fields';
import { ReleaseSlotForm } from './release-slot-form';

/**
 * The acts on one subject's record: the next one open, the others folded away. While the observation window runs there
 * is nothing to be done of oneself, so the outcome is folded away too.
 */
export function SubjectActs({
  work,
  subject,
  spot,
  actions,
  isPrimary,
}: {
  work: CohortWork;
  subject: OwnSubjectData;
  spot: string;
  actions: CohortActions;
  isPrimary: boolean;
}) {
  const { acts } = subject;
  // The revision one corrected last: the form is gone until the newer record arrives, and begins with that one.
  const [corrected, setCorrected] = useState(0);
  const common = { work, subject, spot };
  if (subject.state === 'reserved') {
    const { recordDosing, releaseSlot } = acts;
    return (
      <div className="mt-3 grid gap-3">
        {recordDosing?.why ? <p className="text-sm font-semibold text-ochre">{recordDosing.why}</p> : null}
        {recordDosing && recordDosing.why === null ? (
          <DosingForm {...common} action={actions.recordDosing} isPrimary={isPrimary} />
        ) : null}
        {releaseSlot ? (
          <ActDisclosure label="Give the place back">
            <ReleaseSlotForm
              trialCode={work.trialCode}
              subject={subject}
              spot={spot}
              action={actions.releaseSlot}
            />
          </ActDisclosure>
        ) : null}
      </div>
    );
  }
  if (subject.state === 'dosed' && acts.recordPresent) {
    return (
      <div className="mt-3">
        <ActDisclosure label="Record an outcome" isNext={whyNotAbsent(subject, work) === undefined}>
          <OutcomeForm {...common} action={actions.recordOutcome} isPrimary={isPrimary} />
        </ActDisclosure>
      </div>
    );
  }
  if (acts.correctOutcome && corrected !== subject.revision) {
    return (
      <div className="mt-3">
        <ActDisclosure key={corrected} label="Correct the outcome">
          <CorrectionForm
            {...common}
            action={actions.correctOutcome}
            onCorrected={() => setCorrected(subject.revision)}
          />
        </ActDisclosure>
      </div>
    );
  }
  return null;
}
