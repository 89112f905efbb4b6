import { ProportionByDose } from '@/components/charts/proportion-by-dose';
import { Section } from '@/components/layout/section';
import type { Design } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';

/** A response proportion at a dose, as the queries give it. */
export interface ProportionRow {
  readonly dose: string;
  readonly responses: number;
  readonly evaluable: number;
  readonly low: number;
  readonly high: number;
}

/** Response proportions by dose with Wilson intervals, and what they must not be read as. */
export function ProportionSection({
  design,
  proportions,
  from,
  leftOut = null,
}: {
  design: Pick<Design, 'response' | 'target' | 'unit' | 'scale' | 'doseNotation'>;
  proportions: readonly ProportionRow[];
  /** Which cohorts the counts are from, such as "signed cohorts". */
  from: string;
  leftOut?: string | null;
}) {
  return (
    <Section title={`Share of subjects with ${design.response.present}`}>
      {proportions.length === 0 ? (
        <p className="text-ink-soft">No outcome to show yet.</p>
      ) : (
        <ProportionByDose
          doses={proportions.map(({ responses, ...row }) => ({ ...row, present: responses }))}
          target={design.target}
          unit={unitText(design.unit)}
          scale={design.scale}
          notation={design.doseNotation}
          response={design.response.present}
          level={`95 % Wilson intervals, from ${from}`}
        />
      )}
      {leftOut ? <p className="mt-3 text-sm text-ink-soft">{leftOut}</p> : null}
      <p className="mt-3 max-w-prose text-sm text-ink-soft">
        Shares seen in a trial whose doses follow its outcomes are biased: upward above the target, downward
        below it (Flournoy &amp; Oron 2020). They do not replace the estimate of the design.
      </p>
    </Section>
  );
}
