import { StaticTable } from '@/components/tables/static-table';
import { doseText } from '@/lib/design/dose-text';
import { flips } from '@/lib/design/flips';
import type { CohortHistory } from '@/lib/design/history';
import { nextSteps } from '@/lib/design/next-steps';
import { computedDoseDigits } from '@/lib/design/trace/format';
import type { Design } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';

/**
 * What would follow from the recommended dose: the next dose for every number of responses in the coming cohort, and
 * how much hangs on one outcome of the last one. From the stored history alone, by the trial's own rule.
 */
export function NextSteps({
  design,
  history,
  dose,
  number,
}: {
  design: Design;
  history: readonly CohortHistory[];
  /** The recommended dose. */
  dose: string;
  /** The coming cohort. */
  number: number;
}) {
  const ahead = nextSteps(design, { cohorts: history }, { released: dose });
  if (!ahead.ok) {
    return <p className="text-ink-soft">What would follow cannot be computed: {ahead.error.message}</p>;
  }
  const steps = ahead.value?.steps ?? [];
  return (
    <div>
      <StaticTable
        caption={`Next dose for each number of responses in cohort ${number}`}
        columns={[
          { key: 'responses', header: `“${design.response.present}” in cohort ${number}`, rowHeader: true },
          { key: 'value', header: 'Next value', unit: unitText(design.unit) },
          { key: 'next', header: 'Next dose', strong: true },
        ]}
        rows={steps.map((step) => ({
          id: String(step.responses),
          values: {
            responses: `${step.responses} of ${ahead.value?.subjects ?? design.cohortSize}`,
            value: computedDoseDigits(step.nextDose),
            next: [
              step.kind === 'stop' ? 'stop' : step.dose === null ? 'none' : doseText(design, step.dose),
              ...(step.closedFrom === null ? [] : [`${doseText(design, step.closedFrom)} and above closed`]),
            ].join(' · '),
          },
        }))}
      />
      <FlipWords design={design} history={history} />
    </div>
  );
}

function FlipWords({ design, history }: { design: Design; history: readonly CohortHistory[] }) {
  const last = history.at(-1);
  const found = flips(design, { cohorts: history });
  if (!last || !found.ok || found.value.length === 0) return null;
  const sentence = (response: boolean): string | null => {
    const outcomes = new Set(
      found.value
        .filter((flip) => flip.response === response)
        .map((flip) => (flip.kind === 'stop' || flip.dose === null ? 'a stop' : doseText(design, flip.dose))),
    );
    if (outcomes.size === 0) return null;
    const words = [...outcomes].join(' or ');
    return response
      ? `with one “${design.response.present}” fewer the recommendation would be ${words}`
      : `with one more it would be ${words}`;
  };
  const parts = [sentence(true), sentence(false)].filter((part) => part !== null);
  return (
    <p className="mt-3 text-sm text-ink-soft">
      How much hangs on one outcome of cohort {last.number}: {parts.join('; ')}.
    </p>
  );
}
