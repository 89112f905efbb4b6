'use client';

import { useDeferredValue, useState } from 'react';
import { useWatch, type Control } from 'react-hook-form';
import { designSchema, type Design, type DesignInput } from '@/lib/schemas/design';
import { BelievedCurve } from './believed-curve';
import { StepsPreview } from './steps-preview';

interface PreviewedValues {
  trialCode: string;
  design: DesignInput;
}

/** The consequences of a design while it is written; while an entry does not hold, those of the last design that did. */
export function LivePanel({ control }: { control: Control<PreviewedValues> }) {
  const input = useDeferredValue(useWatch({ control, name: 'design' }));
  const parsed = designSchema.safeParse(emptyAsNull(input));
  const [lastValid, keepValid] = useState<Design | null>(null);
  if (parsed.success && JSON.stringify(parsed.data) !== JSON.stringify(lastValid)) keepValid(parsed.data);
  const design = parsed.success ? parsed.data : lastValid;
  const first = parsed.success ? undefined : parsed.error.issues[0];
  return (
    <aside
      aria-label="Consequences of the design"
      className="grid gap-6 border border-line bg-stone px-4 py-4 min-[68rem]:sticky min-[68rem]:top-4 min-[68rem]:max-h-[calc(100vh-2rem)] min-[68rem]:overflow-y-auto"
    >
      {first ? (
        <p className="border-l-4 border-ochre bg-ochre-wash px-3 py-2 text-sm">
          {design ? 'Shown for the last entries that held together. ' : ''}
          {first.message}
        </p>
      ) : null}
      {design ? (
        <>
          <section className="grid gap-2">
            <h2 className="text-lg">First steps</h2>
            <StepsPreview design={design} />
          </section>
          <section className="grid gap-2 border-t border-line pt-4">
            <h2 className="text-lg">A believed curve</h2>
            <BelievedCurve design={design} />
          </section>
        </>
      ) : null}
    </aside>
  );
}

/** Optional entries left empty mean none, as the form sends them. */
function emptyAsNull(input: DesignInput): unknown {
  const { stopping, guardrails } = input;
  return {
    ...input,
    stopping: {
      ...stopping,
      maximumSubjects: (stopping.maximumSubjects as unknown) === '' ? null : stopping.maximumSubjects,
    },
    guardrails: { ...guardrails, tiesReason: guardrails.tiesReason === '' ? null : guardrails.tiesReason },
    rule:
      'carryReason' in input.rule && input.rule.carryReason === ''
        ? { ...input.rule, carryReason: null }
        : input.rule,
  };
}
