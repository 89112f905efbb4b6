import type { Cohort, TrialState } from '@/lib/conduct/state';
import { lowestFreePlace, placesOf } from '@/lib/conduct/trial-facts';

/** A cohort's state as pages show it: the name that gives it its tone, and its words. */
export interface CohortStanding {
  readonly state: 'open' | 'returned' | 'under-review' | 'signed' | 'cancelled';
  readonly word: string;
}

/** How a cohort stands, in words. */
export function cohortStanding(cohort: Cohort): CohortStanding {
  if (cohort.state === 'open' && cohort.isRecordsOnly) {
    return { state: 'returned', word: 'Returned with questions' };
  }
  if (cohort.state === 'open') {
    return { state: 'open', word: cohort.isClosedShort ? 'Open, no new subjects' : 'Open' };
  }
  const word = { 'under-review': 'Under review', signed: 'Signed', cancelled: 'Cancelled' }[cohort.state];
  return { state: cohort.state, word };
}

const count = (number: number, one: string, many: string) =>
  number === 1 ? `one ${one}` : `${number} ${many}`;

/** What a cohort waits for, and what follows then, in a sentence or two. Holds no dose, code or outcome. */
export function whatFollows(state: TrialState, cohort: Cohort): string {
  const { number } = cohort;
  switch (cohort.state) {
    case 'under-review':
      return state.trial.state === 'halted'
        ? `Cohort ${number} is complete. The trial is halted; the recommendation is made again when the halt is lifted.`
        : `Cohort ${number} is complete; the recommendation waits for the safety reviewers.`;
    case 'signed': {
      const following = Object.values(state.cohorts).some((other) => other.number === number + 1);
      return following
        ? `Cohort ${number} is signed. Cohort ${number + 1} followed.`
        : `Cohort ${number} is signed. No cohort is open.`;
    }
    case 'cancelled':
      return `Cohort ${number} was cancelled.`;
    case 'open':
      break;
  }
  if (cohort.isRecordsOnly) {
    return `The safety reviewers returned cohort ${number} with questions. Answer them by correcting the records where needed, then resubmit; nobody further is reserved or dosed.`;
  }
  const places = placesOf(state, cohort.id);
  const undosed = places.filter((subject) => subject.state === 'reserved').length;
  const dosed = places.filter((subject) => subject.state === 'dosed').length;
  const free = lowestFreePlace(state, cohort) === null ? 0 : cohort.size - places.length;
  const missing = [
    free > 0 ? `${count(free, 'place is free', 'places are free')}` : '',
    undosed > 0
      ? `${count(undosed, 'reserved subject is not dosed yet', 'reserved subjects are not dosed yet')}`
      : '',
    dosed > 0 ? `${count(dosed, 'outcome is still to come', 'outcomes are still to come')}` : '',
  ].filter(Boolean);
  if (missing.length === 0) return `Every outcome of cohort ${number} is in.`;
  const list = missing.join(', ').replace(/, ([^,]*)$/, ' and $1');
  const waiting = `${list.charAt(0).toUpperCase()}${list.slice(1)}.`;
  if (state.trial.state === 'halted') {
    return `${waiting} The trial is halted: outcomes and corrections go on, nobody further is reserved or dosed.`;
  }
  return `${waiting} With the last outcome the recommendation is computed and the safety reviewers are told.`;
}
