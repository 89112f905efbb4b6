'use client';

import { SelectField } from '@/components/forms/choice-fields';
import { NumberField } from '@/components/forms/number-field';
import { FormSection, Indented } from './form-section';
import { kindOf, useKeptVariants } from './use-kept-variants';
import { VariantGroup } from './variant-group';

const USED = [
  { value: 'none', label: 'not used' },
  { value: 'used', label: 'used' },
];

/** When the trial stops; the stop is signed like a step. */
export function StoppingSection({ unit }: { unit: string }) {
  return (
    <FormSection
      title="Stopping"
      lede="Where a rule holds the recommendation is to stop, and it is signed like a step."
    >
      <NumberField name="design.maximumCohorts" label="Maximum of cohorts" whole />
      <NumberField
        name="design.stopping.maximumSubjects"
        label="Maximum of evaluable subjects"
        help="Stops when another cohort would exceed it. Empty for none."
        optional
        whole
        emptyAs={null}
      />
      <Repeated />
      <Precision unit={unit} />
    </FormSection>
  );
}

function Repeated() {
  const { chosen, choose } = useKeptVariants('design.stopping.repeated', kindOf, (kind) =>
    kind === 'none' ? null : { times: 3, subjects: 6 },
  );
  return (
    <>
      <VariantGroup
        name="design.stopping.repeated"
        label="Same dose repeated"
        inline
        variants={USED}
        chosen={chosen}
        onChoose={choose}
      />
      {chosen === 'used' ? (
        <Indented>
          <NumberField
            name="design.stopping.repeated.times"
            label="Recommendations of the same dose in a row"
            whole
          />
          <NumberField
            name="design.stopping.repeated.subjects"
            label="Evaluable subjects given that dose"
            whole
          />
        </Indented>
      ) : null}
    </>
  );
}

function Precision({ unit }: { unit: string }) {
  const { chosen, choose } = useKeptVariants('design.stopping.precision', kindOf, (kind) =>
    kind === 'none' ? null : { estimator: 'logit-fieller', level: 0.8, width: '', minimumSubjects: 12 },
  );
  return (
    <>
      <VariantGroup
        name="design.stopping.precision"
        label="Precision reached"
        inline
        variants={USED}
        chosen={chosen}
        onChoose={choose}
      />
      {chosen === 'used' ? (
        <Indented>
          <SelectField
            name="design.stopping.precision.estimator"
            label="Interval for the target dose"
            choices={[
              { value: 'logit-fieller', label: 'logit fit, Fieller' },
              { value: 'logit-delta', label: 'logit fit, delta method' },
              { value: 'probit-fieller', label: 'probit fit, Fieller' },
              { value: 'probit-delta', label: 'probit fit, delta method' },
              { value: 'last-iterate', label: 'last value of Robbins–Monro (range, γ = 1)' },
            ]}
          />
          <NumberField name="design.stopping.precision.level" label="Level of the interval" />
          <NumberField name="design.stopping.precision.width" label="Width to reach" unit={unit} />
          <NumberField
            name="design.stopping.precision.minimumSubjects"
            label="Subjects before precision is judged"
            whole
          />
        </Indented>
      ) : null}
    </>
  );
}
