import { describe, expect, it } from 'vitest';
import { trialEventSchema } from './events';
import { replay } from './evolve';
import { offersFor } from './offers';
import type { RecommendationRecord } from './recommendation-record';
import { awaitingRecommendation, currentCohort, standingSignatures } from './trial-facts';
import {
  administrator,
  ConductTrial,
  coordinatorA,
  coordinatorB,
  DAY,
  firstReviewer,
  HOUR,
  monitor,
  secondReviewer,
  sha256,
  SITE_A,
  SITE_B,
  sponsor,
  statistician,
  testDesign,
  thirdReviewer,
} from '@/tests/factories/conduct-trial';

const refusalOf = (decision: ReturnType<ConductTrial['ask']>) => {
  if (decision.ok) throw new Error('It was not refused.');
  return decision.refusal;
};

describe('a trial from draft to its second cohort', () => {
  it('opens with the quorum on the starting dose', () => {
    const trial = new ConductTrial().withTeam().withDesign().approved();
    expect(trial.state.trial.state).toBe('in-review');
    expect(trial.awaiting).toMatchObject({ number: 1, revision: 1, outcome: 'dose', dose: '10' });
    trial.act(firstReviewer, trial.signCommand('release'));
    expect(trial.state.trial.state).toBe('in-review');
    trial.act(secondReviewer, trial.signCommand('release'));
    expect(trial.state.trial.state).toBe('open');
    expect(currentCohort(trial.state)).toMatchObject({ number: 1, dose: '10', size: 3, state: 'open' });
  });

  it('computes the recommendation with the last outcome and not before', () => {
    const trial = ConductTrial.opened();
    trial.runCohort(0);
    expect(currentCohort(trial.state)).toMatchObject({ number: 1, state: 'under-review' });
    // Robbins & Monro (1951), by hand: ln 10 − 4.5 (0 − 0.25) = ln 30.8, capped at ln(2 × 10): 20 mg.
    expect(trial.awaiting).toMatchObject({ number: 2, dose: '20' });
    const record = JSON.parse(trial.awaiting.record) as RecommendationRecord;
    expect(record.history).toHaveLength(1);
    expect(sha256(trial.awaiting.record)).toBe(trial.awaiting.digest);
    trial.released();
    expect(trial.cohort).toMatchObject({ number: 2, dose: '20' });
    expect(Object.values(trial.state.cohorts).find((each) => each.number === 1)?.state).toBe('signed');
  });

  it('is rebuilt from its events exactly', () => {
    const trial = ConductTrial.opened().runCohort(0).released().runCohort(1).released('20');
    for (const event of trial.events) trialEventSchema.parse(event.payload);
    expect(replay(trial.events)).toEqual(trial.state);
  });
});

describe('signing a recommendation', () => {
  const awaiting = () => ConductTrial.opened().runCohort(0);

  it('refuses a dose above the recommended one', () => {
    const trial = awaiting();
    for (const dose of ['40', '120', '20.0000000001']) {
      expect(refusalOf(trial.ask(firstReviewer, trial.signCommand('release', { dose }))).message).toMatch(
        /cannot be released by anyone/,
      );
    }
  });

  it('refuses a lower dose that is no level, or without a reason', () => {
    const trial = awaiting();
    expect(
      refusalOf(trial.ask(firstReviewer, trial.signCommand('release', { dose: '15', reason: 'Be careful.' })))
        .message,
    ).toMatch(/not a dose of the design/);
    expect(
      refusalOf(trial.ask(firstReviewer, trial.signCommand('release', { dose: '10' }))).fields,
    ).toHaveProperty('reason');
  });

  it('counts signatures per dose; a standing lower one blocks the higher', () => {
    const trial = awaiting();
    trial.act(firstReviewer, trial.signCommand('release'));
    trial.act(
      secondReviewer,
      trial.signCommand('release', { dose: '10', reason: 'A second look at 10 mg.' }),
    );
    trial.act(thirdReviewer, trial.signCommand('release'));
    expect(currentCohort(trial.state)?.state).toBe('under-review');
    trial.act(firstReviewer, trial.signCommand('release', { dose: '10', reason: 'Agreed with the second.' }));
    expect(trial.cohort).toMatchObject({ number: 2, dose: '10' });
    const release = trial.state.releases[trial.cohort.releaseId];
    expect(release).toMatchObject({ recommendedDose: '20', dose: '10' });
  });

  it('lets a signer replace their own signature and counts it once', () => {
    const trial = awaiting();
    trial.act(firstReviewer, trial.signCommand('release'));
    trial.act(firstReviewer, trial.signCommand('release'));
    expect(standingSignatures(trial.state, trial.awaiting.id)).toHaveLength(1);
    expect(currentCohort(trial.state)?.number).toBe(1);
  });

  it('tells the one who comes after the release that it is decided', () => {
    const trial = awaiting();
    const late = trial.signCommand('release');
    trial.released();
    expect(refusalOf(trial.ask(thirdReviewer, late))).toMatchObject({ code: 'conflict' });
  });

  it('stops the trial when the quorum signs the stop, and one stop blocks a release', () => {
    const trial = awaiting();
    trial.act(firstReviewer, trial.signCommand('stop', { reason: 'Two serious events elsewhere.' }));
    trial.act(secondReviewer, trial.signCommand('release'));
    trial.act(thirdReviewer, trial.signCommand('release'));
    expect(trial.state.trial.state).toBe('open');
    trial.act(secondReviewer, trial.signCommand('stop', { reason: 'I agree with the first.' }));
    expect(trial.state.trial.state).toBe('closed');
    expect(currentCohort(trial.state)).toBeNull();
  });

  it('returns a packet by one signature; resubmitted it starts at zero', () => {
    const trial = awaiting();
    trial.act(secondReviewer, trial.signCommand('release'));
    trial.act(firstReviewer, trial.signCommand('return', { reason: 'Was the onset of AB-101 checked?' }));
    expect(trial.cohort).toMatchObject({ state: 'open', isRecordsOnly: true });
    expect(refusalOf(trial.ask(firstReviewer, { ...late(trial), type: 'sign-recommendation' })).code).toBe(
      'conflict',
    );
    trial.act(coordinatorA, { type: 'resubmit-cohort', input: { cohortId: trial.cohort.id } });
    expect(trial.awaiting).toMatchObject({ number: 2, revision: 2 });
    expect(standingSignatures(trial.state, trial.awaiting.id)).toHaveLength(0);
  });

  const late = (trial: ConductTrial) => {
    const returned = Object.values(trial.state.recommendations).find((each) => each.state === 'returned');
    return {
      type: 'sign-recommendation' as const,
      input: {
        recommendationId: returned?.id ?? '',
        seenDigest: returned?.digest ?? '',
        decision: 'release' as const,
        dose: '10',
        reason: null,
      },
    };
  };

  it('sends the design back to draft when the starting dose is returned', () => {
    const trial = new ConductTrial().withTeam().withDesign().approved();
    trial.act(firstReviewer, trial.signCommand('return', { reason: 'The start is above the animal data.' }));
    expect(trial.state.trial.state).toBe('draft');
    expect(trial.version).toMatchObject({
      state: 'draft',
      returnedReason: 'The start is above the animal data.',
    });
    expect(awaitingRecommendation(trial.state)).toBeNull();
    trial.withDesign({ ...testDesign, maximumCohorts: 8 }).approved();
    expect(trial.awaiting).toMatchObject({ number: 1, revision: 2 });
  });
});

describe('separation of roles', () => {
  it('gives nobody but reviewers a signature', () => {
    const trial = ConductTrial.opened().runCohort(0);
    for (const actor of [statistician, coordinatorA, sponsor, monitor, administrator]) {
      expect(['forbidden', 'not-found']).toContain(
        refusalOf(trial.ask(actor, trial.signCommand('release'))).code,
      );
    }
  });

  it('refuses a signing role for one who recorded data or proposed a design', () => {
    const trial = ConductTrial.opened().runCohort(0);
    for (const actor of [coordinatorA, statistician]) {
      const personId = actor.personId ?? '';
      trial.act(administrator, { type: 'end-membership', input: { personId } });
      const refusal = refusalOf(
        trial.ask(administrator, {
          type: 'grant-membership',
          input: { personId, role: 'reviewer', siteIds: [] },
        }),
      );
      expect(refusal.fields).toHaveProperty('role');
    }
  });

  it('refuses a second role, a role for oneself, a site role without sites and another with sites', () => {
    const trial = new ConductTrial().withTeam();
    const grant = (personId: string, role: 'reviewer' | 'coordinator' | 'sponsor', siteIds: string[] = []) =>
      trial.ask(administrator, { type: 'grant-membership', input: { personId, role, siteIds } });
    expect(refusalOf(grant('reviewer-1', 'sponsor')).fields).toHaveProperty('personId');
    expect(refusalOf(grant('administrator', 'reviewer')).fields).toHaveProperty('personId');
    expect(refusalOf(grant('someone', 'coordinator')).fields).toHaveProperty('siteIds');
    expect(refusalOf(grant('someone', 'sponsor', [SITE_A])).fields).toHaveProperty('siteIds');
    expect(refusalOf(grant('someone', 'coordinator', ['elsewhere'])).fields).toHaveProperty('siteIds');
  });

  it('does not submit a design without the quorum of eligible reviewers', () => {
    const trial = new ConductTrial().withTeam().withDesign();
    for (const reviewer of [secondReviewer, thirdReviewer]) {
      trial.act(administrator, { type: 'end-membership', input: { personId: reviewer.personId ?? '' } });
    }
    expect(
      refusalOf(trial.ask(statistician, { type: 'submit-design', input: { versionId: trial.version.id } }))
        .message,
    ).toMatch(/as many eligible safety reviewers as the quorum/);
  });
});

describe('places, dosing and outcomes', () => {
  it('never gives more places than the cohort has', () => {
    const trial = ConductTrial.opened();
    for (const code of ['AB-01', 'AB-02', 'AB-03']) trial.reserve(coordinatorA, SITE_A, code);
    const fourth = trial.ask(coordinatorB, {
      type: 'reserve-slot',
      input: { cohortId: trial.cohort.id, siteId: SITE_B, code: 'AB-04' },
    });
    expect(refusalOf(fourth)).toMatchObject({ code: 'conflict' });
  });

  it('gives a released place to the next', () => {
    const trial = ConductTrial.opened();
    const id = trial.reserve(coordinatorA, SITE_A, 'AB-01');
    trial.act(coordinatorA, { type: 'release-slot', input: { subjectId: id, reason: 'Screen failure.' } });
    const next = trial.reserve(coordinatorB, SITE_B, 'AB-01');
    expect(trial.state.subjects[next]?.place).toBe(1);
  });

  it('treats another site’s record as if it did not exist', () => {
    const trial = ConductTrial.opened();
    const id = trial.reserve(coordinatorA, SITE_A, 'AB-01');
    const acts = [
      { type: 'release-slot', input: { subjectId: id, reason: 'Not mine to release.' } },
      { type: 'record-outcome', input: { subjectId: id, outcome: 'absent', onsetAt: null } },
      { type: 'reserve-slot', input: { cohortId: trial.cohort.id, siteId: SITE_A, code: 'AB-09' } },
    ] as const;
    for (const command of acts) expect(refusalOf(trial.ask(coordinatorB, command)).code).toBe('not-found');
  });

  it('records "absent" only after the window, "present" with an onset inside it', () => {
    const trial = ConductTrial.opened();
    const id = trial.reserve(coordinatorA, SITE_A, 'AB-01');
    trial.dose(coordinatorA, id);
    const outcome = (outcomeOf: 'present' | 'absent', onsetAt: number | null = null) =>
      trial.ask(coordinatorA, {
        type: 'record-outcome',
        input: {
          subjectId: id,
          outcome: outcomeOf,
          onsetAt: onsetAt === null ? null : new Date(onsetAt).toISOString(),
        },
      });
    const dosedAt = trial.now;
    trial.pass(28 * DAY - 1);
    expect(refusalOf(outcome('absent')).message).toMatch(/can be recorded from then on/);
    expect(refusalOf(outcome('present', dosedAt - 1)).fields).toHaveProperty('onsetAt');
    expect(refusalOf(outcome('present', trial.now + 1)).fields).toHaveProperty('onsetAt');
    expect(outcome('present', dosedAt + HOUR).ok).toBe(true);
    trial.pass(1);
    expect(outcome('absent').ok).toBe(true);
    trial.pass(DAY);
    expect(refusalOf(outcome('present', dosedAt + 28 * DAY + 1)).message).toMatch(/an event, not an outcome/);
    expect(outcome('present', dosedAt + 28 * DAY).ok).toBe(true);
  });

  it('asks why another dose was given than the released one, compared as decimals', () => {
    const trial = ConductTrial.opened();
    const id = trial.reserve(coordinatorA, SITE_A, 'AB-01');
    const dosing = (doseGiven: string, deviationReason: string | null = null) =>
      trial.ask(coordinatorA, {
        type: 'record-dosing',
        input: { subjectId: id, dosedAt: new Date(trial.now).toISOString(), doseGiven, deviationReason },
      });
    expect(refusalOf(dosing('20')).fields).toHaveProperty('deviationReason');
    expect(dosing('20', 'The wrong vial was taken.').ok).toBe(true);
    expect(dosing('10').ok).toBe(true);
    expect(refusalOf(dosing('0', 'None was given.')).fields).toHaveProperty('doseGiven');
  });

  it('supersedes the recommendation when an outcome under review is corrected', () => {
    const trial = ConductTrial.opened().runCohort(0);
    trial.act(firstReviewer, trial.signCommand('release'));
    const subject = Object.values(trial.state.subjects)[0];
    const correction = {
      type: 'correct-outcome',
      input: {
        subjectId: subject?.id ?? '',
        seenRevision: subject?.revision ?? 0,
        outcome: 'present',
        onsetAt: new Date(Date.parse(subject?.dosedAt ?? '') + DAY).toISOString(),
        reason: 'The source says grade 3 on day 1.',
      },
    } as const;
    trial.act(coordinatorA, correction);
    expect(trial.awaiting).toMatchObject({ number: 2, revision: 2, dose: '10' });
    expect(standingSignatures(trial.state, trial.awaiting.id)).toHaveLength(0);
    expect(refusalOf(trial.ask(coordinatorA, correction)).code).toBe('conflict');
  });
});

describe('halting', () => {
  it('is for every role but the monitor, and stops reserving, dosing and release', () => {
    for (const actor of [coordinatorA, sponsor, statistician, firstReviewer]) {
      expect(ConductTrial.opened().act(actor, halt)).toEqual(['trial-halted']);
    }
    const trial = ConductTrial.opened();
    expect(refusalOf(trial.ask(monitor, halt)).code).toBe('forbidden');
    const id = trial.reserve(coordinatorA, SITE_A, 'AB-01');
    trial.act(sponsor, halt);
    expect(() => trial.dose(coordinatorA, id)).toThrow(/halted/);
    expect(() => trial.reserve(coordinatorB, SITE_B, 'AB-02')).toThrow(/halted/);
  });

  const halt = { type: 'halt-trial', input: { reason: 'An unexpected death at another site.' } } as const;

  it('lapses the signatures on a waiting packet, which is computed anew when the quorum lifts', () => {
    const trial = ConductTrial.opened().runCohort(0);
    trial.act(firstReviewer, trial.signCommand('release'));
    trial.act(coordinatorA, halt);
    expect(awaitingRecommendation(trial.state)).toBeNull();
    const haltId = Object.keys(trial.state.halts)[0] ?? '';
    const lift = (plan: 'continue' | 'close-short') =>
      ({ type: 'sign-lift', input: { haltId, plan, reason: 'The event was unrelated.' } }) as const;
    trial.act(firstReviewer, lift('continue'));
    trial.act(secondReviewer, lift('close-short'));
    expect(trial.state.trial.state).toBe('halted');
    trial.act(secondReviewer, lift('continue'));
    expect(trial.state.trial.state).toBe('open');
    expect(trial.awaiting).toMatchObject({ number: 2, revision: 2 });
    expect(standingSignatures(trial.state, trial.awaiting.id)).toHaveLength(0);
  });

  it('closes the cohort short on that plan: no dosed subject is dropped', () => {
    const trial = ConductTrial.opened();
    const dosed = trial.reserve(coordinatorA, SITE_A, 'AB-01');
    const undosed = trial.reserve(coordinatorB, SITE_B, 'AB-02');
    trial.dose(coordinatorA, dosed);
    trial.act(coordinatorB, halt);
    trial.pass(29 * DAY);
    const haltId = Object.keys(trial.state.halts)[0] ?? '';
    for (const reviewer of [firstReviewer, secondReviewer]) {
      trial.act(reviewer, {
        type: 'sign-lift',
        input: { haltId, plan: 'close-short', reason: 'No more at this dose.' },
      });
    }
    expect(trial.state.subjects[undosed]?.state).toBe('cancelled');
    expect(trial.cohort.state).toBe('open');
    trial.act(coordinatorA, {
      type: 'record-outcome',
      input: { subjectId: dosed, outcome: 'absent', onsetAt: null },
    });
    expect(trial.cohort.state).toBe('under-review');
    expect((JSON.parse(trial.awaiting.record) as RecommendationRecord).history[0]?.subjects).toHaveLength(1);
  });
});

describe('offers', () => {
  it('say what decide would say', () => {
    const trial = ConductTrial.opened();
    const offered = (
      actor: typeof coordinatorA,
      role: 'coordinator' | 'reviewer' | 'monitor',
      siteIds: string[],
    ) =>
      offersFor(
        trial.state,
        { personId: actor.personId ?? '', role, siteIds },
        new Date(trial.now).toISOString(),
      );
    const id = trial.reserve(coordinatorA, SITE_A, 'AB-01');
    expect(offered(coordinatorA, 'coordinator', [SITE_A]).subjects[id]?.recordDosing).toEqual({ why: null });
    expect(offered(coordinatorB, 'coordinator', [SITE_B]).subjects[id]).toBeUndefined();
    trial.dose(coordinatorA, id);
    expect(offered(coordinatorA, 'coordinator', [SITE_A]).subjects[id]?.recordAbsent?.why).toMatch(/window/);
    expect(offered(monitor, 'monitor', []).halt).toBeUndefined();
    expect(offered(firstReviewer, 'reviewer', []).signRecommendation).toBeUndefined();
  });
});
