import { Section, TwoColumns } from '@/components/layout/section';
import { StaticTable } from '@/components/tables/static-table';
import { ruleOf } from '@/lib/design/rules/registry';
import type { Design } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';
import {
  cohortItems,
  doseItems,
  finalItems,
  guardrailItems,
  responseItems,
  stoppingItems,
} from './design-words';
import { levelRows } from './level-rows';
import { ruleFormula, ruleItems } from './rule-words';
import { TemplateFormula, WordsList } from './words-list';
import { workingUnit } from './working-unit';

/** A design as a protocol would say it: every setting in words, in the order it acts. */
export function DesignInWords({ design }: { design: Design }) {
  const { about } = ruleOf(design.rule.name);
  return (
    <>
      <TwoColumns>
        <Section title="Response">
          <WordsList items={responseItems(design)} />
        </Section>
        <Section title="Cohorts">
          <WordsList items={cohortItems(design)} />
        </Section>
      </TwoColumns>
      <Section title="Doses">
        {design.doses.kind === 'levels' ? (
          <TwoColumns>
            <LevelsTable design={design} />
            <WordsList items={doseItems(design)} />
          </TwoColumns>
        ) : (
          <WordsList items={doseItems(design)} />
        )}
      </Section>
      <Section title={`Rule: ${about.title}`}>
        <p className="max-w-prose">{about.suits}</p>
        <p className="my-3 overflow-x-auto">
          <TemplateFormula template={ruleFormula(design.rule)} design={design} />
        </p>
        <WordsList items={[...ruleItems(design.rule, design), { term: 'Source', detail: about.source }]} />
      </Section>
      <Section title="Guardrails">
        <WordsList items={guardrailItems(design)} />
      </Section>
      <TwoColumns>
        <Section title="Stopping">
          <WordsList items={stoppingItems(design)} />
        </Section>
        <Section title="Final estimate">
          <WordsList items={finalItems(design)} />
        </Section>
      </TwoColumns>
    </>
  );
}

function LevelsTable({ design }: { design: Design }) {
  const rows = levelRows(design);
  return (
    <StaticTable
      caption="Dose levels"
      columns={[
        { key: 'level', header: 'Level', rowHeader: true },
        { key: 'dose', header: 'Dose', unit: unitText(design.unit), kind: 'number', strong: true },
        { key: 'working', header: 'Value', unit: workingUnit(design), end: true },
        { key: 'rise', header: design.scale === 'log' ? 'Fold from below' : 'Step from below', end: true },
      ]}
      rows={rows.map((row) => ({
        id: String(row.level),
        values: { level: row.level, dose: row.dose, working: row.working, rise: row.rise },
        content: row.doseShown === null ? undefined : { dose: row.doseShown },
      }))}
    />
  );
}
