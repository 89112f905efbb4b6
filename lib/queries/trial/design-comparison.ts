import { historyOf } from '@/lib/conduct/recommendation-record';
import { cohortsInOrder, versionInForce } from '@/lib/conduct/trial-facts';
import { comparableDesign } from '@/lib/design/comparable-rule';
import { compareDesigns, type ComparedStep } from '@/lib/design/compare-rules';
import { RULE_NAMES, ruleOf } from '@/lib/design/rules/registry';
import type { Design, RuleName } from '@/lib/schemas/design';
import type { ReaderTrial } from './reader-trial';

/** What one rule would have recommended for one cohort. */
export interface ComparedDose {
  /** The dose, with `isStop` the one that would follow; null where every dose is closed or the rule gave no value. */
  readonly dose: string | null;
  readonly isStop: boolean;
}

/** One rule on the recorded history. */
export interface ComparedRule {
  readonly name: RuleName;
  readonly title: string;
  /** The design it was run under: the one in force with this rule, its settings taken over where they are not its own. */
  readonly design: Design;
  readonly isOwn: boolean;
  /** By cohort, from cohort 1 to the one after the last completed; null where it failed, with the sentence in `failure`. */
  readonly doses: readonly ComparedDose[] | null;
  readonly failure: string | null;
}

/** "What would each have recommended": rules on the same recorded history, beside what was released. */
export interface ComparisonView {
  readonly design: Design;
  readonly versionNumber: number;
  /** Every rule, in the order offered, and whether it is among those compared. */
  readonly offered: readonly {
    readonly name: RuleName;
    readonly title: string;
    readonly isChosen: boolean;
  }[];
  readonly rules: readonly ComparedRule[];
  /** The released dose of each cohort, from cohort 1 to the one after the last completed; null where none is released yet. */
  readonly released: readonly (string | null)[];
}

/** What a design's own rule is set beside when nothing else was asked for. */
const COMPARED_FIRST: readonly RuleName[] = ['virtual-observations', 'robbins-monro'];

function doseOf({ dose, kind }: ComparedStep): ComparedDose {
  return { dose, isStop: kind === 'stop' };
}

/**
 * The comparison for a trial with a completed cohort; null before one, or for a reader who may not see recommendations.
 * @param chosen the rules asked for; fewer than two are completed by the design's own and by the rule it is first set beside
 */
export function comparisonOf(trial: ReaderTrial, chosen: readonly RuleName[]): ComparisonView | null {
  if (!trial.may('recommendation.read')) return null;
  const { state } = trial.loaded;
  const version = versionInForce(state);
  const history = historyOf(state);
  if (version === null || history.length === 0) return null;
  const { design } = version;
  const compared = new Set<RuleName>(chosen);
  for (const name of [design.rule.name, ...COMPARED_FIRST]) if (compared.size < 2) compared.add(name);
  const names = RULE_NAMES.filter((name) => compared.has(name));
  const designs = names.map((name) => ({ label: name, design: comparableDesign(name, design) }));
  const courses = compareDesigns(designs, { cohorts: history });
  const start: ComparedDose = { dose: design.startingDose, isStop: false };
  const cohorts = cohortsInOrder(state);
  return {
    design,
    versionNumber: version.number,
    offered: RULE_NAMES.map((name) => ({
      name,
      title: ruleOf(name).about.title,
      isChosen: compared.has(name),
    })),
    rules: names.map((name, index) => {
      const course = courses[index]?.course;
      return {
        name,
        title: ruleOf(name).about.title,
        design: designs[index]?.design ?? design,
        isOwn: name === design.rule.name,
        doses: course?.ok ? [start, ...course.value.map(doseOf)] : null,
        failure: course && !course.ok ? course.error.message : null,
      };
    }),
    released: Array.from(
      { length: history.length + 1 },
      (_, index) => cohorts.find((cohort) => cohort.number === index + 1)?.dose ?? null,
    ),
  };
}
