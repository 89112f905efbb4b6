'use client';

import { useFormContext } from 'react-hook-form';
import { Checkbox } from '@/components/forms/checkbox-fields';
import { RadioGroup } from '@/components/forms/choice-fields';
import { NumberField } from '@/components/forms/number-field';
import { ESTIMATOR_TITLES } from '../estimator-titles';
import { FormSection, Indented } from './form-section';
import { useKeptVariants } from './use-kept-variants';
import { VariantGroup } from './variant-group';

const HELP: Readonly<Record<keyof typeof ESTIMATOR_TITLES, string>> = {
  'centred-isotonic':
    'Assumes only that the probability is monotone. Oron & Flournoy 2017; bootstrap interval.',
  isotonic: 'Assumes only that the probability is monotone; pooled adjacent violators; bootstrap interval.',
  logit: 'A logistic curve through all subjects at the doses really given.',
  probit: 'A normal curve through all subjects at the doses really given.',
  'last-iterate': 'Where the rule ends. An interval exists for Robbins–Monro on a range with γ = 1 only.',
  'polyak-ruppert': 'The mean of the rule’s values; efficient only for a gain exponent below 1. No interval.',
};
const NAMES = Object.keys(HELP) as (keyof typeof HELP)[];

const nameOf = (value: unknown): string =>
  typeof value === 'object' && value !== null && 'name' in value ? String(value.name) : '';

/** The estimator of the target dose at the end, fixed beforehand. */
export function FinalEstimateSection() {
  const { getValues } = useFormContext();
  const { chosen, choose } = useKeptVariants('design.finalEstimator', nameOf, (name) => {
    const intervalLevel = getValues('design.finalEstimator.intervalLevel') as unknown;
    if (name === 'polyak-ruppert') return { name, burnIn: 0, intervalLevel };
    if (name === 'logit' || name === 'probit')
      return { name, firth: true, interval: 'fieller', intervalLevel };
    return { name, intervalLevel };
  });
  const fits = chosen === 'logit' || chosen === 'probit';
  return (
    <FormSection title="Final estimate" lede="Chosen before anyone is dosed.">
      <VariantGroup
        name="design.finalEstimator"
        label="Estimator of the target dose"
        labelHidden
        variants={NAMES.map((name) => ({ value: name, label: ESTIMATOR_TITLES[name], help: HELP[name] }))}
        chosen={chosen}
        onChoose={choose}
      />
      <Indented>
        {chosen === 'polyak-ruppert' ? (
          <NumberField
            name="design.finalEstimator.burnIn"
            label="Leading values left out"
            help="0 to use all."
            whole
          />
        ) : null}
        {fits ? (
          <>
            <Checkbox name="design.finalEstimator.firth" label="Fit with Firth’s penalty" />
            <RadioGroup
              name="design.finalEstimator.interval"
              label="Interval by"
              inline
              choices={[
                { value: 'fieller', label: 'Fieller' },
                { value: 'delta', label: 'delta method' },
              ]}
            />
          </>
        ) : null}
        <NumberField key={chosen} name="design.finalEstimator.intervalLevel" label="Level of the interval" />
      </Indented>
    </FormSection>
  );
}
