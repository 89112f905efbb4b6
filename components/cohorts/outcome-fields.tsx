'use client';

import { useEffect } from 'react';
import { useFormContext, useWatch } from 'react-hook-form';
import { RadioGroup } from '@/components/forms/choice-fields';
import { DateTimeField } from '@/components/forms/date-time-field';
import { formatTime } from '../ui/format-time';
import type { CohortWork, SubjectData } from './cohort-data';

/** Why "absent" cannot be recorded yet, with the time from which it can; undefined when it can. */
export function whyNotAbsent(subject: SubjectData, work: CohortWork): string | undefined {
  const { windowEndsAt, site } = subject;
  if (windowEndsAt === null || windowEndsAt <= work.readAt) return undefined;
  return `The observation window ends on ${formatTime(windowEndsAt, site.timeZone)}; this can be recorded from then on.`;
}

/** The outcome of a subject in the trial's own labels, and when it began where it is present. */
export function OutcomeFields({
  work,
  subject,
  label,
}: {
  work: CohortWork;
  subject: SubjectData;
  label: string;
}) {
  const { labels } = work;
  const { setValue } = useFormContext();
  const outcome: unknown = useWatch({ name: 'outcome' });
  const isPresent = outcome === 'present';
  useEffect(() => {
    if (!isPresent) setValue('onsetAt', null);
  }, [isPresent, setValue]);
  return (
    <>
      <RadioGroup
        name="outcome"
        label={label}
        choices={[
          { value: 'present', label: labels.present },
          {
            value: 'absent',
            label: labels.absent,
            disabledReason: whyNotAbsent(subject, work),
          },
        ]}
      />
      {isPresent ? (
        <DateTimeField
          name="onsetAt"
          label="When it began"
          help={
            subject.windowEndsAt
              ? `Between the dosing and the end of the window, ${formatTime(subject.windowEndsAt, subject.site.timeZone)}.`
              : undefined
          }
          zone={subject.site.timeZone}
          place={subject.site.name}
          readAt={work.readAt}
          notBefore={subject.dosedAt ?? undefined}
          emptyAs={null}
        />
      ) : null}
    </>
  );
}
