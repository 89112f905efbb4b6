import type { ClosingCriterion } from './closing';
import type { CompiledDesign } from './compiled';
import { highestBelow } from './dose-set';
import { PLACE, type TrialState } from './trial-state';

/**
 * METHODS step 7: finds the lowest closed dose and takes the recommendation below it. `PLACE.CLOSED_FROM` becomes its
 * index (the number of doses when none is closed); `PLACE.FINAL` the recommended dose, −1 when none is left.
 */
export function closeDoses(compiled: CompiledDesign, trial: TrialState): void {
  const { place } = trial;
  const index = place[PLACE.ENOUGH] as number;
  const closedFrom = compiled.closing === null ? compiled.doses.count : lowestClosed(compiled, trial);
  place[PLACE.CLOSED_FROM] = closedFrom;
  place[PLACE.FINAL] = index < closedFrom ? index : closedFrom - 1;
}

function lowestClosed(compiled: CompiledDesign, trial: TrialState): number {
  const criterion = compiled.closing as ClosingCriterion;
  const { doses } = compiled;
  if (compiled.sign < 0) return isHighestClosed(compiled, criterion, trial) ? 0 : doses.count;
  if (doses.kind === 'levels') {
    const last = criterion.settings.scope === 'lowest-level' ? 1 : doses.count;
    for (let level = 0; level < last; level += 1) {
      if (criterion.isMet(trial.levelN[level] as number, trial.levelY[level] as number)) return level;
    }
    return doses.count;
  }
  let n = 0;
  let y = 0;
  for (let i = 0; i < trial.groups; i += 1) {
    n += trial.groupN[i] as number;
    y += trial.groupY[i] as number;
    if (criterion.isMet(n, y)) return highestBelow(doses.workings, trial.groupX, i) + 1;
  }
  return doses.count;
}

/** A harm that falls with dose: when even the highest dose is too harmful, none is left. */
function isHighestClosed(compiled: CompiledDesign, criterion: ClosingCriterion, trial: TrialState): boolean {
  const { doses } = compiled;
  const last = doses.count - 1;
  if (doses.kind === 'levels') {
    return criterion.isMet(trial.levelN[last] as number, trial.levelY[last] as number);
  }
  const highest = doses.working(last);
  let n = 0;
  let y = 0;
  for (let i = 0; i < trial.groups; i += 1) {
    if ((trial.groupX[i] as number) >= highest) {
      n += trial.groupN[i] as number;
      y += trial.groupY[i] as number;
    }
  }
  return criterion.isMet(n, y);
}
