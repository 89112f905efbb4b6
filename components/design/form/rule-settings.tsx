'use client';

import { useFormContext, useWatch } from 'react-hook-form';
import { Checkbox } from '@/components/forms/checkbox-fields';
import { RadioGroup } from '@/components/forms/choice-fields';
import { NumberField } from '@/components/forms/number-field';
import { TextArea } from '@/components/forms/text-field';
import type { RuleName } from '@/lib/schemas/design';
import { Indented } from './form-section';
import { kindOf, useKeptVariants } from './use-kept-variants';
import { VariantGroup } from './variant-group';

interface Settings {
  readonly unit: string;
  readonly isRange: boolean;
}

/** The settings of one rule. @param unit the unit of the working scale, such as "ln mg" */
export function RuleSettingsFields({ name, ...settings }: Settings & { name: RuleName }) {
  switch (name) {
    case 'robbins-monro':
    case 'kesten':
      return <GainFields {...settings} />;
    case 'joseph':
      return <JosephFields {...settings} />;
    case 'virtual-observations':
      return <VirtualObservationsFields {...settings} />;
    case 'adaptive-slope':
      return <AdaptiveSlopeFields {...settings} />;
    case 'logit-ml':
      return <LogitFields {...settings} />;
  }
}

function GainFields(settings: Settings) {
  return (
    <>
      <NumberField
        name="design.rule.c"
        label="Gain constant c"
        unit={settings.unit}
        help="Per unit of probability. The best is 1/D, the inverse of the curve’s slope at the target dose; err on the large side."
      />
      <NumberField name="design.rule.k0" label="Gain offset k0" help="Keeps early moves small; 0 for none." />
      <NumberField
        name="design.rule.gamma"
        label="Gain exponent γ"
        help={
          <>
            The step sizes a<sub>k</sub> = c/(k + k<sub>0</sub>)<sup>γ</sup> must add up to infinity (Σa
            <sub>k</sub> = ∞), so that no distance is too far, and their squares must not (Σa<sub>k</sub>²
            &lt; ∞), so that the steps settle: 1/2 &lt; γ ≤ 1.
          </>
        }
      />
      <CarryFields {...settings} />
    </>
  );
}

/** What the rule carries on from. */
function CarryFields({ isRange }: Settings) {
  const { control } = useFormContext();
  const carry = useWatch({ control, name: 'design.rule.carry' }) as string;
  return (
    <>
      <RadioGroup
        name="design.rule.carry"
        label="Carries on from"
        choices={[
          { value: 'iterate', label: 'the value it assigned', help: 'Before rounding to a dose.' },
          {
            value: 'given',
            label: 'the mean dose really given',
            help: isRange
              ? undefined
              : 'On levels it ratchets down and then freezes: it needs a written reason.',
          },
        ]}
      />
      {carry === 'given' ? (
        <TextArea
          name="design.rule.carryReason"
          label="Reason for carrying the dose given"
          optional={isRange}
          emptyAs={null}
        />
      ) : null}
    </>
  );
}

function JosephFields({ unit, isRange }: Settings) {
  return (
    <>
      <NumberField
        name="design.rule.slope"
        label="Probit slope"
        unit={`per ${unit}`}
        help="The slope of a probit curve at the target dose, not of the curve itself: D divided by φ(Φ⁻¹(Γ))."
      />
      <NumberField
        name="design.rule.priorSd"
        label="Prior standard deviation τ₁"
        unit={unit}
        help={`How far the start may be from the target dose, on the working scale.${isRange ? '' : ' On levels the rule is an approximation: it takes the dose given for the assigned value.'}`}
      />
    </>
  );
}

function VirtualObservationsFields({ unit }: Settings) {
  const { chosen, choose } = useKeptVariants('design.rule.carryBounds', kindOf, (kind) =>
    kind === 'none' ? null : { lowest: '', highest: '' },
  );
  return (
    <>
      <NumberField
        name="design.rule.slope"
        label="Assumed slope b"
        unit={`per ${unit}`}
        help="The curve’s slope D at the target dose, as assumed. A large one sticks to a level, a small one roams: choose it by simulation."
      />
      <VariantGroup
        name="design.rule.carryBounds"
        label="Bounds of the carried value"
        help="With bounds the order of cohorts matters; without, it does not."
        inline
        variants={[
          { value: 'none', label: 'none' },
          { value: 'used', label: 'bounded' },
        ]}
        chosen={chosen}
        onChoose={choose}
      />
      {chosen === 'used' ? (
        <Indented>
          <NumberField name="design.rule.carryBounds.lowest" label="Lowest carried value" unit={unit} />
          <NumberField name="design.rule.carryBounds.highest" label="Highest carried value" unit={unit} />
        </Indented>
      ) : null}
    </>
  );
}

function AdaptiveSlopeFields(settings: Settings) {
  const { control } = useFormContext();
  const [form, carry] = useWatch({ control, name: ['design.rule.form', 'design.rule.carry'] }) as string[];
  const perUnit = `per ${settings.unit}`;
  return (
    <>
      <RadioGroup
        name="design.rule.form"
        label="Form"
        choices={[
          { value: 'last', label: 'from the last value', help: 'The last cohort moves it.' },
          { value: 'mean', label: 'from the means', help: 'All cohorts move it, at the doses really given.' },
        ]}
      />
      <NumberField name="design.rule.initialSlope" label="Slope until one can be fitted" unit={perUnit} />
      <NumberField name="design.rule.slopeLow" label="Smallest slope" unit={perUnit} />
      <NumberField name="design.rule.slopeHigh" label="Largest slope" unit={perUnit} />
      <Checkbox name="design.rule.weighted" label="Weight cohorts by their evaluable subjects" />
      {form === 'mean' && carry === 'iterate' ? null : <CarryFields {...settings} />}
    </>
  );
}

function LogitFields({ unit }: Settings) {
  return (
    <>
      <Checkbox
        name="design.rule.firth"
        label="Use Firth’s penalty where the likelihood has no finite maximum"
      />
      <NumberField
        name="design.rule.c"
        label="Gain constant c of the fallback step"
        unit={unit}
        help="Where no fit can be used the value moves by c/k times the difference from the target."
      />
      <NumberField
        name="design.rule.largestMove"
        label="Largest move"
        unit={unit}
        help="From the mean dose given."
      />
    </>
  );
}
