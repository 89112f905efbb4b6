import type { CompiledDesign } from '../compiled';
import { judgePrecision } from '../precision';
import { STOP, stopReasons, subjectsGivenFinal } from '../stopping';
import { PLACE, type TrialState } from '../trial-state';
import { computed, exact, exactDose, type TraceLine, type TraceNumber } from './line';

/** The lines of step 8: cohorts and subjects always, then each rule the design has. */
export function stoppingLines(compiled: CompiledDesign, trial: TrialState): TraceLine[] {
  return [
    cohortsLine(compiled, trial),
    ...repeatedLines(compiled, trial),
    ...precisionLines(compiled, trial),
  ];
}

function verdict(trial: TrialState, flag: number): Pick<TraceLine, 'acted' | 'result' | 'reason'> {
  const reason = stopReasons(trial.stop & flag)[0];
  if (reason === undefined) return { acted: false, result: { word: 'go-on' } };
  return { acted: true, result: { word: 'stop' }, reason: { code: reason, numbers: {} } };
}

function cohortsLine(compiled: CompiledDesign, trial: TrialState): TraceLine {
  const { maximumCohorts, stopping, cohortSize } = compiled.design;
  const maximum = stopping.maximumSubjects;
  const numbers: Record<string, TraceNumber> = {
    cohort: exact(trial.cohorts),
    cohorts: exact(maximumCohorts),
    subjects: exact(trial.subjects),
    ...(maximum === null ? {} : { maximum: exact(maximum), next: exact(cohortSize) }),
  };
  return {
    id: 'stopping',
    step: 8,
    formula:
      maximum === null
        ? 'cohort {cohort} of {cohorts}, {subjects} subjects'
        : 'cohort {cohort} of {cohorts}, {subjects} of {maximum} subjects',
    numbers,
    ...verdict(trial, STOP.maximumCohorts | STOP.maximumSubjects | STOP.closedAll),
  };
}

function repeatedLines(compiled: CompiledDesign, trial: TrialState): TraceLine[] {
  const rule = compiled.design.stopping.repeated;
  const final = trial.place[PLACE.FINAL] as number;
  if (rule === null || final < 0) return [];
  return [
    {
      id: 'repeated',
      step: 8,
      formula:
        '{dose} {unit} recommended {times} of {needed} times in a row, {subjects} of {minimum} subjects at it',
      numbers: {
        dose: exactDose(compiled.doses.dose(final)),
        times: exact(trial.repeats),
        needed: exact(rule.times),
        subjects: exact(subjectsGivenFinal(compiled, trial)),
        minimum: exact(rule.subjects),
      },
      ...verdict(trial, STOP.repeated),
    },
  ];
}

function precisionLines(compiled: CompiledDesign, trial: TrialState): TraceLine[] {
  const rule = compiled.design.stopping.precision;
  if (rule === null) return [];
  const shared = { id: 'precision', step: 8 } as const;
  if (trial.subjects < rule.minimumSubjects) {
    return [
      {
        ...shared,
        formula: '{subjects} of {minimum} subjects',
        numbers: { subjects: exact(trial.subjects), minimum: exact(rule.minimumSubjects) },
        ...verdict(trial, STOP.precision),
      },
    ];
  }
  const { estimate } = judgePrecision(compiled, trial, rule);
  const interval = estimate?.interval;
  const bounded = interval?.type === 'bounded' && interval.lower !== null && interval.upper !== null;
  return [
    {
      ...shared,
      formula: bounded
        ? 'width {width}, at most {limit} needed'
        : 'no bounded interval, at most {limit} needed',
      numbers: {
        limit: exact(rule.width),
        ...(bounded ? { width: computed((interval.upper ?? 0) - (interval.lower ?? 0)) } : {}),
      },
      ...verdict(trial, STOP.precision),
    },
  ];
}
