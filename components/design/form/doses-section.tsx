'use client';

import { useState } from 'react';
import { useFormContext, useWatch } from 'react-hook-form';
import { RadioGroup } from '@/components/forms/choice-fields';
import { DecimalField } from '@/components/forms/number-field';
import { FormSection, Indented } from './form-section';
import { LevelsField } from './levels-field';
import type { FreshSettings } from './fresh-settings';
import { UnitField, type OfferedUnit } from './unit-field';
import { kindOf, useKeptVariants } from './use-kept-variants';
import { VariantGroup } from './variant-group';

const SKIPPING = 'design.guardrails.noSkipping';

/** The doses that may be released, their unit, scale and start. */
export function DosesSection({ units, fresh }: { units: readonly OfferedUnit[]; fresh: FreshSettings }) {
  const { control, getValues, setValue } = useFormContext();
  const unit = useWatch({ control, name: 'design.unit' }) as string;
  const shown = units.find((each) => each.code === unit)?.text ?? unit;
  const [skippingOnLevels, keepSkipping] = useState<string | null>(null);
  const { chosen, choose } = useKeptVariants('design.doses', kindOf, (kind) =>
    kind === 'range' ? fresh.range : fresh.levels,
  );
  // The rule against skipping is for levels: it rests on a range and comes back with the levels.
  const chooseKind = (kind: string) => {
    const skipping = getValues(SKIPPING) as string;
    if (kind === 'range' && chosen !== 'range') keepSkipping(skipping);
    const next = kind === 'range' ? 'off' : (skippingOnLevels ?? skipping);
    if (next !== skipping) setValue(SKIPPING, next, { shouldDirty: true });
    choose(kind);
  };
  return (
    <FormSection title="Doses">
      <UnitField units={units} />
      <VariantGroup
        name="design.doses"
        label="Doses are"
        variants={[
          { value: 'levels', label: 'levels', help: 'A list, lowest first.' },
          {
            value: 'range',
            label: 'a range',
            help: 'From a lowest dose by an increment to at most a highest.',
          },
        ]}
        chosen={chosen}
        onChoose={chooseKind}
      />
      <Indented>
        {chosen === 'range' ? (
          <>
            <DecimalField name="design.doses.lowest" label="Lowest dose" unit={shown} />
            <DecimalField name="design.doses.highest" label="Highest dose" unit={shown} />
            <DecimalField name="design.doses.increment" label="Increment" unit={shown} />
          </>
        ) : (
          <LevelsField unit={shown} />
        )}
      </Indented>
      <DecimalField name="design.startingDose" label="Starting dose" unit={shown} />
      <RadioGroup
        name="design.scale"
        label="Working scale"
        help="The scale the rule moves on. Slopes, gains and bounds below are in its units."
        choices={[
          { value: 'log', label: 'logarithmic, x = ln d', help: 'Every dose must be above 0.' },
          { value: 'linear', label: 'linear, x = d' },
        ]}
      />
      <RadioGroup
        name="design.doseNotation"
        label="Doses are printed"
        inline
        choices={[
          { value: 'plain', label: 'as decimals' },
          { value: 'powers-of-ten', label: 'as powers of ten' },
        ]}
      />
    </FormSection>
  );
}
