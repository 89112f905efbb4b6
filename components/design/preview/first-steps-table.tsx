import type { Column } from '@/components/tables/columns';
import { StaticTable } from '@/components/tables/static-table';
import { doseText } from '@/lib/design/dose-text';
import type { Design } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import { unitText } from '@/lib/schemas/units';
import { FIRST_STEPS, firstSteps } from './first-steps';

/** The first ten steps in dose units, seen from one dose of the design. */
export function FirstStepsTable({ design, around }: { design: Design; around: Dose }) {
  const steps = firstSteps(design, around);
  const unit = unitText(design.unit);
  const columns: Column[] = [
    { key: 'k', header: 'k', rowHeader: true },
    { key: 'gain', header: 'Gain', end: true },
    { key: 'none', header: 'After none', unit, end: true },
    { key: 'all', header: 'After all', unit, end: true },
    ...(steps.some(({ moveNone }) => moveNone !== null)
      ? [{ key: 'moveNone', header: 'Cohorts without, to change', end: true }]
      : []),
    ...(steps.some(({ moveAll }) => moveAll !== null)
      ? [{ key: 'moveAll', header: 'Cohorts of all, to change', end: true }]
      : []),
  ];
  return (
    <StaticTable
      caption={`The first ${steps.length} steps from ${doseText(design, around)}`}
      columns={columns}
      rows={steps.map((step) => ({
        id: String(step.k),
        values: {
          k: step.k,
          gain: step.gain,
          none: step.afterNone,
          all: step.afterAll,
          moveNone: step.moveNone,
          moveAll: step.moveAll,
        },
      }))}
    />
  );
}

/** How the table is read. */
export function StepsNote({ design }: { design: Design }) {
  return (
    <p className="max-w-prose text-sm text-ink-soft">
      After none, after all: where the rule’s value would go from there after one cohort without a response,
      and after one of responses only, before any guardrail.
      {design.doses.kind === 'levels'
        ? ' To change: how many such cohorts in a row change the level, and to which, guardrails included; frozen where more would be needed than remain.'
        : ''}
    </p>
  );
}

/** The first ten steps from the starting dose, and how they are read. */
export function FirstSteps({ design }: { design: Design }) {
  return (
    <div className="grid gap-2.5">
      <p className="font-semibold">
        The first {FIRST_STEPS} steps from {doseText(design, design.startingDose)}
      </p>
      <FirstStepsTable design={design} around={design.startingDose} />
      <StepsNote design={design} />
    </div>
  );
}
