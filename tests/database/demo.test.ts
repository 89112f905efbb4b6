import { beforeAll, expect, it } from 'vitest';
import {
  awaitingRecommendation,
  currentCohort,
  placesOf,
  standingSignatures,
} from '@/lib/conduct/trial-facts';
import { findTrial } from '@/lib/queries/load-trial-state';
import { verifyEveryChain } from '@/lib/queries/verify-chain';
import { loadDemo } from '@/scripts/demo/load';
import { createTestDatabase } from '../setup/database';

beforeAll(async () => {
  await createTestDatabase();
  await loadDemo();
});

async function stateOf(code: string) {
  const loaded = await findTrial({ code });
  if (loaded === null) throw new Error(`There is no trial ${code}.`);
  return loaded.state;
}

it('brings the oncology trial half way, with one outcome due', async () => {
  const state = await stateOf('WELL-02');
  const cohort = currentCohort(state);
  expect(cohort).toMatchObject({ number: 5, state: 'open', dose: '60' });
  const due = placesOf(state, cohort?.id ?? '').filter(
    ({ state: life, windowEndsAt }) => life === 'dosed' && Date.parse(windowEndsAt ?? '') < Date.now(),
  );
  expect(due).toHaveLength(1);
});

it('has a packet of the ED90 study wait with one of two signatures', async () => {
  const state = await stateOf('SPRING-04');
  const awaiting = awaitingRecommendation(state);
  expect(awaiting).toMatchObject({ number: 8, outcome: 'dose' });
  expect(standingSignatures(state, awaiting?.id ?? '')).toHaveLength(1);
});

it('has the third cohort of the infection study in its window, and the last trial in draft', async () => {
  const state = await stateOf('FORD-11');
  const cohort = currentCohort(state);
  expect(cohort).toMatchObject({ number: 3, state: 'open', dose: '100000' });
  expect(placesOf(state, cohort?.id ?? '').map((subject) => subject.state)).toEqual([
    'complete',
    'dosed',
    'dosed',
    'dosed',
  ]);
  expect((await stateOf('BROOK-07')).trial.state).toBe('draft');
});

it('leaves every chain of the trail whole', async () => {
  let chains = 0;
  for await (const verdict of verifyEveryChain()) {
    expect(verdict.firstBreak, verdict.name).toBeNull();
    chains += 1;
  }
  expect(chains).toBe(5);
});
