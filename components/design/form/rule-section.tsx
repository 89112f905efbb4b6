'use client';

import { useFormContext, useWatch } from 'react-hook-form';
import type { RuleName } from '@/lib/schemas/design';
import { FormSection, Indented } from './form-section';
import type { OfferedRule } from './fresh-settings';
import { RuleSettingsFields } from './rule-settings';
import { useKeptVariants } from './use-kept-variants';
import { VariantGroup } from './variant-group';

const ruleName = (value: unknown): string =>
  typeof value === 'object' && value !== null && 'name' in value ? String(value.name) : '';

/** The rule that moves the dose: each with its source and when it suits, the chosen one with its settings. */
export function RuleSection({ rules, unit }: { rules: readonly OfferedRule[]; unit: string }) {
  const { control } = useFormContext();
  const isRange = useWatch({ control, name: 'design.doses.kind' }) === 'range';
  const { chosen, choose } = useKeptVariants(
    'design.rule',
    ruleName,
    (name) => rules.find((rule) => rule.name === name)?.fresh,
  );
  return (
    <FormSection
      title="Rule"
      lede="How the next value follows from a cohort. Changing the rule keeps what was typed for the others."
    >
      <VariantGroup
        name="design.rule"
        label="Rule"
        labelHidden
        variants={rules.map(({ name, title, source, suits }) => ({
          value: name,
          label: title,
          help: (
            <>
              {suits} <span className="whitespace-normal">Source: {source}.</span>
            </>
          ),
        }))}
        chosen={chosen}
        onChoose={choose}
      />
      <Indented>
        <RuleSettingsFields key={chosen} name={chosen as RuleName} unit={unit} isRange={isRange} />
      </Indented>
    </FormSection>
  );
}
