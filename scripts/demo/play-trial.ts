import type { TrialCommand } from '@/lib/conduct/decision';
import { awaitingRecommendation, currentCohort, placesOf } from '@/lib/conduct/trial-facts';
import { type ProvenIdentity, proveIdentity } from '@/lib/commands/prove-identity';
import { runTrialCommand } from '@/lib/commands/run-trial-command';
import { newId } from '@/lib/hash';
import { findTrial, type LoadedTrial } from '@/lib/queries/load-trial-state';
import { type TrialCommandType, type TrialInputSchemas, trialInputSchemas } from '@/lib/schemas/trial-inputs';
import type { z } from 'zod';

export const HOUR = 3_600_000;
export const DAY = 24 * HOUR;

/** A person who acts in a played trial. */
export interface Player {
  readonly personId: string;
  readonly email: string;
  readonly password: string;
}

/** One subject of a played cohort; times are in milliseconds after the cohort's opening. */
export interface PlayedSubject {
  readonly coordinator: Player;
  readonly siteId: string;
  readonly code: string;
  readonly reservedAfter: number;
  /** Left out: the place is reserved and no more. */
  readonly dosedAfter?: number;
  readonly doseGiven?: string;
  readonly deviationReason?: string;
  /** Left out: no outcome is recorded. A number: present, with its onset so long after the dosing. */
  readonly outcome?: 'absent' | number;
}

const proven = new Map<string, Promise<ProvenIdentity>>();

/** Proves a player's identity once a process: what is played is the trial, not the password check. */
function identityOf(player: Player): Promise<ProvenIdentity> {
  const known = proven.get(player.personId);
  if (known) return known;
  const fresh = proveIdentity({
    email: player.email,
    password: player.password,
    purpose: 'signature',
    clientAddress: '127.0.0.1',
    expectedPersonId: player.personId,
  });
  proven.set(player.personId, fresh);
  return fresh;
}

/**
 * Plays a trial by the application's own commands, at times of one's choosing: nothing is inserted past the rules.
 * The demonstration and the tests are built with it.
 */
export class TrialPlay {
  readonly code: string;
  /** The time the next command happens at, in milliseconds since 1970. */
  now: number;

  constructor(code: string, startsAt: number) {
    this.code = code;
    this.now = startsAt;
  }

  /** Parses and runs one command as a player. */
  async run<Type extends TrialCommandType>(
    player: Player,
    type: Type,
    input: z.input<TrialInputSchemas[Type]>,
    options: { readonly signs?: boolean } = {},
  ): Promise<void> {
    const parsed = trialInputSchemas[type].parse(input);
    const at = this.now;
    await runTrialCommand({
      personId: player.personId,
      trialCode: this.code,
      command: { type, input: parsed } as TrialCommand,
      submissionKey: newId(),
      clock: () => at,
      ...(options.signs ? { identity: await identityOf(player) } : {}),
    });
  }

  /** The trial as it stands. */
  async loaded(): Promise<LoadedTrial> {
    const loaded = await findTrial({ code: this.code });
    if (loaded === null) throw new Error(`There is no trial ${this.code}.`);
    return loaded;
  }

  /** Lets time pass. */
  pass(milliseconds: number): void {
    this.now += milliseconds;
  }

  /** Saves, submits and approves a design; the starting dose then waits for signatures. */
  async design(
    statistician: Player,
    approver: Player,
    design: z.input<TrialInputSchemas['save-design']>['design'],
  ): Promise<void> {
    await this.run(statistician, 'save-design', { design });
    this.pass(DAY);
    const draft = Object.values((await this.loaded()).state.designVersions)[0];
    if (!draft) throw new Error('The design was not saved.');
    await this.run(statistician, 'submit-design', { versionId: draft.id });
    this.pass(DAY);
    await this.run(
      approver,
      'approve-design',
      { versionId: draft.id, seenDigest: draft.digest },
      { signs: true },
    );
  }

  /** Has reviewers sign the awaiting recommendation: at its dose, or at a lower one with a reason. */
  async release(
    reviewers: readonly Player[],
    lower?: { readonly dose: string; readonly reason: string },
  ): Promise<void> {
    const awaiting = awaitingRecommendation((await this.loaded()).state);
    if (!awaiting?.dose) throw new Error('No dose waits for signatures.');
    for (const reviewer of reviewers) {
      await this.run(
        reviewer,
        'sign-recommendation',
        {
          recommendationId: awaiting.id,
          seenDigest: awaiting.digest,
          decision: 'release',
          dose: lower?.dose ?? awaiting.dose,
          reason: lower?.reason ?? null,
        },
        { signs: true },
      );
      this.pass(2 * HOUR);
    }
  }

  /** Reserves, doses and follows the subjects of the open cohort, each event at its time. */
  async cohort(subjects: readonly PlayedSubject[]): Promise<void> {
    const { state } = await this.loaded();
    const cohort = currentCohort(state);
    if (!cohort) throw new Error('No cohort is open.');
    const window = state.designVersions[cohort.designVersionId]?.design.observationWindow;
    const windowLength = (window?.length ?? 0) * (window?.unit === 'hours' ? HOUR : DAY);
    const opened = Date.parse(cohort.openedAt);
    const acts = subjects.flatMap((subject) => this.#actsOf(subject, cohort, opened, windowLength));
    for (const act of acts.sort((a, b) => a.at - b.at)) {
      this.now = Math.max(this.now, act.at);
      await act.run();
    }
  }

  async #subjectId(code: string): Promise<string> {
    const { state } = await this.loaded();
    const cohort = currentCohort(state);
    const subject = cohort && placesOf(state, cohort.id).find((each) => each.code === code);
    if (!subject) throw new Error(`No subject ${code} in the open cohort.`);
    return subject.id;
  }

  #actsOf(
    subject: PlayedSubject,
    cohort: { id: string; dose: string },
    opened: number,
    windowLength: number,
  ): { at: number; run: () => Promise<void> }[] {
    const { coordinator, siteId, code, dosedAfter, outcome } = subject;
    const acts = [
      {
        at: opened + subject.reservedAfter,
        run: () => this.run(coordinator, 'reserve-slot', { cohortId: cohort.id, siteId, code }),
      },
    ];
    if (dosedAfter === undefined) return acts;
    const dosedAt = opened + dosedAfter;
    acts.push({
      at: dosedAt + HOUR,
      run: async () =>
        this.run(coordinator, 'record-dosing', {
          subjectId: await this.#subjectId(code),
          dosedAt: new Date(dosedAt).toISOString(),
          doseGiven: subject.doseGiven ?? cohort.dose,
          deviationReason: subject.deviationReason ?? null,
        }),
    });
    if (outcome === undefined) return acts;
    const isPresent = typeof outcome === 'number';
    acts.push({
      at: isPresent ? dosedAt + outcome + 6 * HOUR : dosedAt + windowLength + 20 * HOUR,
      run: async () =>
        this.run(coordinator, 'record-outcome', {
          subjectId: await this.#subjectId(code),
          outcome: isPresent ? 'present' : 'absent',
          onsetAt: isPresent ? new Date(dosedAt + outcome).toISOString() : null,
        }),
    });
    return acts;
  }
}
