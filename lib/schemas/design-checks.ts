import type { z } from 'zod';
import { compareDecimals, decimalToNumber } from '@/lib/design/decimal';
import { exactGrid, gridIndex, gridValue, type ExactGrid } from '@/lib/design/dose-grid';
import { DESIGN_LIMITS } from './design-limits';
import type { Design } from './design';

type Refuse = (path: PropertyKey[], message: string) => void;

/** Checks between fields of a design; each refusal stands at the field to change. */
export function checkDesign(design: Design, context: z.core.$RefinementCtx<Design>): void {
  const refuse: Refuse = (path, message) =>
    context.addIssue({ code: 'custom', path, message, input: undefined });
  checkResponse(design, refuse);
  checkRule(design, refuse);
  checkStopping(design, refuse);
  if (design.evaluableForRise > design.cohortSize) {
    refuse(
      ['evaluableForRise'],
      `A rise needs ${design.evaluableForRise} evaluable subjects, more than the cohort's ${design.cohortSize}, so no cohort could rise. Enter at most ${design.cohortSize}.`,
    );
  }
  if (
    design.guardrails.largestRise === null &&
    design.response.kind === 'harm' &&
    design.doses.kind === 'range'
  ) {
    refuse(
      ['guardrails', 'largestRise'],
      'For a harm on a range of doses the largest rise from one cohort to the next must be bounded. Enter a fold such as 2, or a step on the working scale.',
    );
  }
  const values = doseValues(design, refuse);
  if (values !== null) checkGuardrails(design, values, refuse);
}

/** The design doses a check needs, lowest first; for a grid only the first two and the last matter here. */
interface DoseValues {
  values: readonly number[];
  lowest: number;
  highest: number;
  start: number;
}

function checkResponse({ response }: Design, refuse: Refuse): void {
  if (response.present.toLowerCase() === response.absent.toLowerCase()) {
    refuse(
      ['response', 'absent'],
      'Both labels are the same, so a response could not be told from none. Enter two different labels.',
    );
  }
}

function doseValues(design: Design, refuse: Refuse): DoseValues | null {
  const { doses, startingDose } = design;
  const isLevels = doses.kind === 'levels';
  let sound = true;
  const fault: Refuse = (path, message) => {
    sound = false;
    refuse(path, message);
  };
  if (isLevels) {
    doses.levels.forEach((dose, index) => {
      const before = doses.levels[index - 1];
      if (before !== undefined && compareDecimals(dose, before) <= 0) {
        fault(
          ['doses', 'levels', index],
          `Level ${index + 1}, ${dose}, is not above level ${index}, ${before}. Enter the levels lowest first, each once.`,
        );
      }
    });
  }
  const grid = isLevels ? null : checkedGrid(doses, fault);
  const lowest = isLevels ? (doses.levels[0] ?? '0') : doses.lowest;
  if (design.scale === 'log' && decimalToNumber(lowest) === 0) {
    fault(
      isLevels ? ['doses', 'levels', 0] : ['doses', 'lowest'],
      'A dose of 0 has no logarithm, and on the log scale every dose is above 0. Enter a dose above 0 or choose the linear scale.',
    );
  }
  const known = isLevels
    ? doses.levels.some((dose) => compareDecimals(dose, startingDose) === 0)
    : grid !== null && gridIndex(grid, startingDose) >= 0;
  if (!known && (isLevels || grid !== null)) {
    fault(
      ['startingDose'],
      isLevels
        ? `The starting dose ${startingDose} is none of the levels. Enter one of them.`
        : `The starting dose ${startingDose} is not on the grid from ${doses.lowest} by ${doses.increment} to ${doses.highest}. Enter one of its doses.`,
    );
  }
  if (!sound) return null;
  const values = isLevels
    ? doses.levels.map(decimalToNumber)
    : grid === null
      ? []
      : [gridValue(grid, 0), gridValue(grid, 1), gridValue(grid, grid.count - 1)];
  return {
    values: isLevels ? values : values.slice(0, 2),
    lowest: values[0] ?? 0,
    highest: values[values.length - 1] ?? 0,
    start: decimalToNumber(startingDose),
  };
}

function checkedGrid(doses: Extract<Design['doses'], { kind: 'range' }>, refuse: Refuse): ExactGrid | null {
  const { minimum, maximum } = DESIGN_LIMITS.gridDoses;
  const grid = exactGrid(doses.lowest, doses.highest, doses.increment);
  if (grid === 'increment') {
    refuse(
      ['doses', 'increment'],
      'The increment is 0, but the doses must differ. Enter an increment above 0.',
    );
  } else if (grid === 'order') {
    refuse(
      ['doses', 'highest'],
      `The highest dose ${doses.highest} is not above the lowest, ${doses.lowest}. Enter a higher one.`,
    );
  } else if (grid === 'digits') {
    refuse(
      ['doses', 'increment'],
      'The doses have more digits than can be kept exactly, about 15 from first to last. Enter a lowest dose and increment with fewer decimals.',
    );
  } else if (grid.count < minimum) {
    refuse(
      ['doses', 'increment'],
      `With the increment ${doses.increment} the range holds one dose only; it must hold at least ${minimum}. Enter a smaller increment.`,
    );
  } else if (grid.count > maximum) {
    refuse(
      ['doses', 'increment'],
      `With the increment ${doses.increment} the range holds ${grid.count} doses; it may hold ${maximum}. Enter a larger increment.`,
    );
  } else {
    return grid;
  }
  return null;
}

function checkRule(design: Design, refuse: Refuse): void {
  const { rule } = design;
  if ('carry' in rule && rule.carry === 'given') {
    if (rule.name === 'adaptive-slope' && rule.form === 'mean') {
      refuse(
        ['rule', 'carry'],
        'The form by means starts from the mean dose given and carries no value. Choose iterate, or the form last.',
      );
    } else if (design.doses.kind === 'levels' && rule.carryReason === null) {
      refuse(
        ['rule', 'carryReason'],
        'Carrying the dose given on levels ratchets down and then freezes, because a small step rounds back to the same level. Enter the reason for it, or carry the assigned value (iterate).',
      );
    }
  }
  if (rule.name === 'adaptive-slope' && rule.slopeLow > rule.slopeHigh) {
    refuse(
      ['rule', 'slopeHigh'],
      `The largest slope ${rule.slopeHigh} is below the smallest, ${rule.slopeLow}. Enter a larger one.`,
    );
  }
}

function checkGuardrails(design: Design, doses: DoseValues, refuse: Refuse): void {
  const { guardrails, response } = design;
  const range = design.doses.kind === 'range';
  checkLargestRise(design, doses, refuse);
  if (guardrails.projection !== null) {
    const { lowest, highest } = guardrails.projection;
    const start = design.scale === 'log' ? Math.log(doses.start) : doses.start;
    if (lowest >= highest) {
      refuse(
        ['guardrails', 'projection', 'highest'],
        `The upper end ${highest} of the projection is not above the lower, ${lowest}. Enter the lower end first.`,
      );
    } else if (start < lowest - 1e-9 || start > highest + 1e-9) {
      refuse(
        ['guardrails', 'projection'],
        `The starting dose is ${start} on the working scale, outside the projection from ${lowest} to ${highest}. Enter ends on either side of it.`,
      );
    }
  }
  if (guardrails.ties === 'higher') {
    if (response.kind === 'harm') {
      refuse(
        ['guardrails', 'ties'],
        'Ties may go to the higher dose for a wanted response only; the response here is a harm. Choose lower.',
      );
    } else if (guardrails.tiesReason === null) {
      refuse(
        ['guardrails', 'tiesReason'],
        'Sending ties to the higher dose needs a written reason. Enter it, or choose lower.',
      );
    }
  }
  if (range && guardrails.noSkipping !== 'off') {
    refuse(
      ['guardrails', 'noSkipping'],
      'The rule against skipping is for levels; a range is bounded by the largest rise. Choose off.',
    );
  }
  if (guardrails.closing !== null) {
    if (response.kind === 'wanted') {
      refuse(
        ['guardrails', 'closing'],
        'Levels close for a harm only; the response here is wanted. Leave closing out (null).',
      );
    } else if (guardrails.closing.scope === 'lowest-level' && (range || response.direction === 'falling')) {
      refuse(
        ['guardrails', 'closing', 'scope'],
        'Closing by the lowest level alone is for levels with a rising response. Choose every-level.',
      );
    }
  }
}

function checkLargestRise(design: Design, doses: DoseValues, refuse: Refuse): void {
  const { largestRise } = design.guardrails;
  if (largestRise === null) return;
  if (largestRise.kind === 'fold' && doses.lowest <= 0) {
    refuse(
      ['guardrails', 'largestRise'],
      'A fold of 0 is 0, so a fold needs a lowest dose above 0. Enter a step instead, or a lowest dose above 0.',
    );
    return;
  }
  for (let index = 0; index + 1 < doses.values.length; index += 1) {
    const low = doses.values[index] ?? 0;
    const high = doses.values[index + 1] ?? 0;
    if (!isRisePossible(largestRise, design.scale, low, high)) {
      refuse(
        ['guardrails', 'largestRise'],
        `Under this bound no rise is possible from ${low} to the next dose, ${high}, and the trial would be stuck there. Enter a bound that lets every dose rise to the next.`,
      );
      return;
    }
  }
}

function isRisePossible(
  rise: NonNullable<Design['guardrails']['largestRise']>,
  scale: Design['scale'],
  low: number,
  high: number,
): boolean {
  const log = scale === 'log';
  const gap = log ? Math.log(high) - Math.log(low) : high - low;
  const allowed = rise.kind === 'step' ? rise.step : log ? Math.log(rise.factor) : (rise.factor - 1) * low;
  return gap <= allowed + 1e-9 * gap;
}

function checkStopping(design: Design, refuse: Refuse): void {
  const { stopping, maximumCohorts, cohortSize, rule } = design;
  if (stopping.maximumSubjects !== null && stopping.maximumSubjects < cohortSize) {
    refuse(
      ['stopping', 'maximumSubjects'],
      `The maximum of ${stopping.maximumSubjects} subjects is below the cohort size ${cohortSize}, so no cohort could be dosed. Enter at least ${cohortSize}.`,
    );
  }
  if (stopping.repeated !== null && stopping.repeated.times > maximumCohorts) {
    refuse(
      ['stopping', 'repeated', 'times'],
      `The same dose ${stopping.repeated.times} times in a row is out of reach in ${maximumCohorts} cohorts. Enter at most ${maximumCohorts}.`,
    );
  }
  if (stopping.precision?.estimator === 'last-iterate') {
    const fits =
      rule.name === 'robbins-monro' &&
      rule.gamma === 1 &&
      rule.carry === 'iterate' &&
      design.doses.kind === 'range';
    if (!fits) {
      refuse(
        ['stopping', 'precision', 'estimator'],
        'The interval of the last value exists for the Robbins–Monro rule on a range with γ = 1 that carries the assigned value. Choose a logit or probit interval.',
      );
    }
  }
  const { finalEstimator } = design;
  if (finalEstimator.name === 'polyak-ruppert' && finalEstimator.burnIn > maximumCohorts) {
    refuse(
      ['finalEstimator', 'burnIn'],
      `Leaving out the first ${finalEstimator.burnIn} values leaves none of the ${maximumCohorts + 1}. Enter at most ${maximumCohorts}.`,
    );
  }
}
