import type { PrecisionRule } from '@/lib/schemas/design';
import type { CompiledDesign } from './compiled';
import { precisionReached, type PrecisionVerdict } from './estimate/precision';
import type { EstimationData } from './estimate/target-estimate';
import { JOSEPH } from './rules/joseph';
import type { TrialState } from './trial-state';

/** What the estimators need, read from a trial's state: rows by dose really given, cohort sizes, the rule's values. */
export function estimationData(compiled: CompiledDesign, trial: TrialState): EstimationData {
  const rows = [];
  for (let i = 0; i < trial.groups; i += 1) {
    rows.push({
      x: trial.groupX[i] as number,
      n: trial.groupN[i] as number,
      y: trial.groupY[i] as number,
    });
  }
  return {
    rows,
    cohortSizes: trial.size.slice(0, trial.steps),
    iterates: trial.iterates.slice(0, trial.steps + 1),
    priorSd:
      compiled.rule.name === 'joseph' ? Math.sqrt(Math.max(0, trial.rule[JOSEPH.TAU2] as number)) : null,
  };
}

/** The verdict of a precision rule after the last cohort (METHODS step 8). */
export function judgePrecision(
  compiled: CompiledDesign,
  trial: TrialState,
  rule: PrecisionRule,
): PrecisionVerdict {
  return precisionReached(compiled.design, rule, estimationData(compiled, trial));
}

/** True when the precision asked for is reached; the data are looked at only from the stated number of subjects on. */
export function isPrecisionReached(
  compiled: CompiledDesign,
  trial: TrialState,
  rule: PrecisionRule,
): boolean {
  return trial.subjects >= rule.minimumSubjects && judgePrecision(compiled, trial, rule).reached;
}
