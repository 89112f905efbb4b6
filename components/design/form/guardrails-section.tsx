'use client';

import { useFormContext, useWatch } from 'react-hook-form';
import { RadioGroup } from '@/components/forms/choice-fields';
import { NumberField } from '@/components/forms/number-field';
import { TextArea } from '@/components/forms/text-field';
import { FormSection, Indented } from './form-section';
import type { FreshSettings } from './fresh-settings';
import { kindOf, useKeptVariants } from './use-kept-variants';
import { VariantGroup } from './variant-group';

/** What bounds the dose the rule asks for, in the order it acts. */
export function GuardrailsSection({ unit, fresh }: { unit: string; fresh: FreshSettings }) {
  const { control } = useFormContext();
  const [kind, responseKind, ties] = useWatch({
    control,
    name: ['design.doses.kind', 'design.response.kind', 'design.guardrails.ties'],
  }) as string[];
  const isRange = kind === 'range';
  return (
    <FormSection
      title="Guardrails"
      lede="They act after the rule, in this order, and each says in the trace what it changed and why."
    >
      <LargestRise unit={unit} isRequired={isRange && responseKind === 'harm'} />
      <Projection unit={unit} />
      <RadioGroup
        name="design.guardrails.ties"
        label="A value halfway between two doses goes to"
        inline
        choices={[
          { value: 'lower', label: 'the lower' },
          { value: 'higher', label: 'the higher' },
        ]}
      />
      {ties === 'higher' ? (
        <TextArea name="design.guardrails.tiesReason" label="Reason for sending ties up" emptyAs={null} />
      ) : null}
      <RadioGroup
        name="design.guardrails.noSkipping"
        label="No skipping of levels"
        help={isRange ? 'For levels only; a range is bounded by the largest rise.' : undefined}
        choices={[
          {
            value: 'tried',
            label: 'at most one level above the highest tried',
            help: 'Tried is the lower of the level released and the level nearest the doses really given.',
          },
          { value: 'current', label: 'at most one level above the current one' },
          { value: 'off', label: 'off' },
        ]}
      />
      <RadioGroup
        name="design.guardrails.coherence"
        label="Coherence"
        choices={[
          {
            value: 'one-way',
            label: 'no step to the riskier side after a cohort at or above the target',
          },
          { value: 'both', label: 'that, and no step back after a cohort below it' },
          { value: 'off', label: 'off' },
        ]}
      />
      <Closing fresh={fresh} />
    </FormSection>
  );
}

function LargestRise({ unit, isRequired }: { unit: string; isRequired: boolean }) {
  const { chosen, choose } = useKeptVariants('design.guardrails.largestRise', kindOf, (kind) =>
    kind === 'fold' ? { kind, factor: 2 } : kind === 'step' ? { kind, step: '' } : null,
  );
  return (
    <>
      <VariantGroup
        name="design.guardrails.largestRise"
        label="Largest rise from one cohort to the next"
        help={isRequired ? 'Needed for a harm on a range of doses.' : undefined}
        inline
        variants={[
          { value: 'fold', label: 'a fold of the dose' },
          { value: 'step', label: 'a step on the working scale' },
          { value: 'none', label: 'not bounded' },
        ]}
        chosen={chosen}
        onChoose={choose}
      />
      {chosen === 'none' ? null : (
        <Indented>
          {chosen === 'fold' ? (
            <NumberField
              name="design.guardrails.largestRise.factor"
              label="Largest fold"
              help="2 lets a dose at most double."
            />
          ) : (
            <NumberField name="design.guardrails.largestRise.step" label="Largest step" unit={unit} />
          )}
        </Indented>
      )}
    </>
  );
}

function Projection({ unit }: { unit: string }) {
  const { chosen, choose } = useKeptVariants('design.guardrails.projection', kindOf, (kind) =>
    kind === 'none' ? null : { lowest: '', highest: '' },
  );
  return (
    <>
      <VariantGroup
        name="design.guardrails.projection"
        label="The value is kept within"
        inline
        variants={[
          { value: 'none', label: 'the lowest and highest dose' },
          { value: 'used', label: 'other ends' },
        ]}
        chosen={chosen}
        onChoose={choose}
      />
      {chosen === 'used' ? (
        <Indented>
          <NumberField name="design.guardrails.projection.lowest" label="Lower end" unit={unit} />
          <NumberField name="design.guardrails.projection.highest" label="Upper end" unit={unit} />
        </Indented>
      ) : null}
    </>
  );
}

function Closing({ fresh }: { fresh: FreshSettings }) {
  const { chosen, choose } = useKeptVariants('design.guardrails.closing', kindOf, (kind) =>
    kind === 'none' ? null : fresh.guardrails.closing,
  );
  return (
    <>
      <VariantGroup
        name="design.guardrails.closing"
        label="Closed doses"
        help="For a harm: a dose, and every dose above it, closes once it is very likely above the target."
        inline
        variants={[
          { value: 'used', label: 'doses can close' },
          { value: 'none', label: 'not used' },
        ]}
        chosen={chosen}
        onChoose={choose}
      />
      {chosen === 'used' ? (
        <Indented>
          <NumberField
            name="design.guardrails.closing.cutoff"
            label="Cutoff"
            help="Closed when the posterior probability of exceeding Γ is above it."
          />
          <NumberField
            name="design.guardrails.closing.minimumEvaluable"
            label="Evaluable subjects before a dose can close"
            whole
          />
          <NumberField name="design.guardrails.closing.priorA" label="Beta prior, first parameter" />
          <NumberField
            name="design.guardrails.closing.priorB"
            label="Beta prior, second parameter"
            help="1 and 1 are the uniform prior."
          />
          <RadioGroup
            name="design.guardrails.closing.scope"
            label="Judged at"
            inline
            choices={[
              { value: 'every-level', label: 'every dose given' },
              { value: 'lowest-level', label: 'the lowest level alone' },
            ]}
          />
        </Indented>
      ) : null}
    </>
  );
}
