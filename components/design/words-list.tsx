import { Formula } from '@/components/trace/formula';
import { DefinitionList } from '@/components/ui/definition-list';
import { printContext } from '@/lib/design/trace/format';
import { templateSegments } from '@/lib/design/trace/segments';
import type { Design } from '@/lib/schemas/design';
import type { WordsItem } from './rule-words';

/** Terms of a design and what holds for them. */
export function WordsList({ items }: { items: readonly WordsItem[] }) {
  return <DefinitionList items={items.map(({ term, detail }) => ({ term, detail, key: term }))} />;
}

/** A formula written as a template of the trace, with its lowered and raised pieces. */
export function TemplateFormula({ template, design }: { template: string; design: Design }) {
  return <Formula segments={templateSegments(template, {}, printContext(design))} />;
}
