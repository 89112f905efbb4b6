import { StaticTable } from '@/components/tables/static-table';
import type { Column } from '@/components/tables/columns';
import { Notice } from '@/components/ui/notice';
import { buttonClass } from '@/components/ui/button';
import { doseText } from '@/lib/design/dose-text';
import type { Design, RuleName } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';
import { ComparisonFigure } from './comparison-figure';
import { comparisonFinding } from './comparison-words';
import { ruleItems } from './rule-words';

/** What one rule would have recommended for one cohort. */
interface ComparedDose {
  readonly dose: string | null;
  readonly isStop: boolean;
}

/** Rules on the same recorded history, as the page's query gives them. */
export interface ComparedRules {
  readonly design: Design;
  readonly versionNumber: number;
  readonly offered: readonly {
    readonly name: RuleName;
    readonly title: string;
    readonly isChosen: boolean;
  }[];
  readonly rules: readonly {
    readonly name: RuleName;
    readonly title: string;
    readonly design: Design;
    readonly isOwn: boolean;
    readonly doses: readonly ComparedDose[] | null;
    readonly failure: string | null;
  }[];
  readonly released: readonly (string | null)[];
}

/** "What would each have recommended": the choice of rules, the chart, and its table. */
export function Comparison({ comparison, address }: { comparison: ComparedRules; address: string }) {
  const { design, rules, released, versionNumber } = comparison;
  const run = rules.filter((rule) => rule.doses !== null);
  const courses = [
    { label: 'released', doses: released, isReleased: true },
    ...run.map((rule) => ({
      label: rule.title,
      doses: (rule.doses ?? []).map(({ dose }) => dose),
      isReleased: false,
    })),
  ];
  return (
    <div className="grid gap-5">
      <p className="max-w-prose">
        Each rule is run from cohort 1 on the recorded outcomes at the doses really given, under version{' '}
        {versionNumber} with its own rule replaced. What was given next is as recorded, whatever a rule would
        have recommended: this shows how rules read the same data, not how a trial under them would have gone.
      </p>
      <RuleChoice comparison={comparison} address={address} />
      {rules
        .filter((rule) => rule.failure !== null)
        .map((rule) => (
          <Notice key={rule.name} kind="refused" title={`${rule.title} gave no value`} live={false}>
            {rule.failure}
          </Notice>
        ))}
      <ComparisonFigure design={design} courses={courses} title={comparisonFinding(comparison)} />
      <ComparisonTable comparison={comparison} />
      <details className="text-sm">
        <summary className="text-water underline underline-offset-3">Settings compared</summary>
        <ul className="mt-2 grid gap-1.5">
          {rules.map((rule) => (
            <li key={rule.name}>
              <span className="font-semibold">{rule.title}</span>
              {rule.isOwn ? ' (the design’s own)' : ''}:{' '}
              {ruleItems(rule.design.rule, design)
                .map(({ term, detail }) => `${term} ${detail}`)
                .join('; ')}
            </li>
          ))}
        </ul>
        <p className="mt-2 max-w-prose text-ink-soft">
          Settings of rules other than the design’s own take the same slope at the target dose for granted as
          it does.
        </p>
      </details>
    </div>
  );
}

function RuleChoice({ comparison, address }: { comparison: ComparedRules; address: string }) {
  return (
    <form method="get" action={`${address}#comparison`} className="grid gap-2">
      <fieldset>
        <legend className="font-semibold">Rules to compare, two or more</legend>
        <div className="flex flex-wrap gap-x-6">
          {comparison.offered.map((rule) => (
            <label key={rule.name} className="flex gap-2.5 py-1">
              <input
                type="checkbox"
                name="compare"
                value={rule.name}
                defaultChecked={rule.isChosen}
                className="mt-0.75 size-4.5 flex-none cursor-pointer accent-water"
              />
              {rule.title}
            </label>
          ))}
        </div>
      </fieldset>
      <div>
        <button type="submit" className={buttonClass('secondary', true)}>
          Compare
        </button>
      </div>
    </form>
  );
}

function ComparisonTable({ comparison }: { comparison: ComparedRules }) {
  const { design, rules, released } = comparison;
  const unit = unitText(design.unit);
  const columns: Column[] = [
    { key: 'cohort', header: 'Cohort', rowHeader: true },
    { key: 'released', header: 'Released', unit, end: true },
    ...rules.map((rule): Column => ({
      key: rule.name,
      header: rule.title,
      unit,
      end: true,
      strong: rule.isOwn,
    })),
  ];
  const bare = (dose: string) => doseText(design, dose).replace(` ${unit}`, '');
  return (
    <StaticTable
      caption="What each rule would have recommended"
      columns={columns}
      rows={released.map((dose, index) => ({
        id: String(index + 1),
        values: {
          cohort: index + 1,
          released: dose === null ? null : bare(dose),
          ...Object.fromEntries(rules.map((rule) => [rule.name, cellText(rule.doses?.[index], bare)])),
        },
      }))}
    />
  );
}

function cellText(compared: ComparedDose | undefined, bare: (dose: string) => string): string | null {
  if (compared === undefined) return null;
  if (compared.dose === null) return 'stop';
  return compared.isStop ? `${bare(compared.dose)} · stop` : bare(compared.dose);
}
