'use client';

import { RadioGroup } from '@/components/forms/choice-fields';
import { NumberField } from '@/components/forms/number-field';
import { FormSection } from './form-section';

/** Cohorts, replacements and the observation window. */
export function CohortsSection() {
  return (
    <FormSection title="Cohorts and window">
      <NumberField name="design.cohortSize" label="Cohort size" unit="subjects" whole />
      <NumberField
        name="design.evaluableForRise"
        label="Evaluable subjects needed for a rise"
        help="With fewer in a cohort the recommendation is at most the current dose."
        whole
      />
      <NumberField
        name="design.replacements"
        label="Replacements in a cohort, at most"
        help="For subjects who are not evaluable, before the cohort is complete."
        whole
      />
      <NumberField name="design.observationWindow.length" label="Observation window" whole />
      <RadioGroup
        name="design.observationWindow.unit"
        label="Unit of the window"
        inline
        choices={[
          { value: 'days', label: 'days' },
          { value: 'hours', label: 'hours' },
        ]}
      />
      <p className="max-w-prose text-sm text-ink-soft">
        Pending outcomes are waited for: the rule uses complete cohorts only.
      </p>
    </FormSection>
  );
}
