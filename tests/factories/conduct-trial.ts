import { createHash } from 'node:crypto';
import { createTrial } from '@/lib/conduct/create-trial';
import { decide } from '@/lib/conduct/decide';
import type { Decision, DecisionActor, TrialCommand } from '@/lib/conduct/decision';
import type { TrialEvent } from '@/lib/conduct/events';
import type { TrialState } from '@/lib/conduct/state';
import { awaitingRecommendation, currentCohort, placesOf } from '@/lib/conduct/trial-facts';
import { designDefaults } from '@/lib/schemas/design-defaults';
import type { Design } from '@/lib/schemas/design';

export const sha256 = (text: string): string => createHash('sha256').update(text).digest('hex');

export const HOUR = 3_600_000;
export const DAY = 24 * HOUR;

type Role = DecisionActor['role'];
const person = (personId: string, role: Role): DecisionActor => ({ personId, printedName: personId, role });

export const administrator = person('administrator', 'administrator');
export const statistician = person('statistician', 'statistician');
export const firstReviewer = person('reviewer-1', 'reviewer');
export const secondReviewer = person('reviewer-2', 'reviewer');
export const thirdReviewer = person('reviewer-3', 'reviewer');
export const sponsor = person('sponsor', 'sponsor');
export const monitor = person('monitor', 'monitor');
export const coordinatorA = person('coordinator-a', 'coordinator');
export const coordinatorB = person('coordinator-b', 'coordinator');
export const SITE_A = 'site-a';
export const SITE_B = 'site-b';

/** Robbins–Monro on six levels, ln scale, c = 4.5, fold cap 2, cohorts of 3, a window of 28 days. */
export const testDesign: Design = {
  ...designDefaults('levels'),
  rule: { name: 'robbins-monro', c: 4.5, k0: 0, gamma: 1, carry: 'iterate', carryReason: null },
};

/** A trial run through the pure core alone: a clock that only goes forward, ids that only count up. */
export class ConductTrial {
  state: TrialState;
  readonly events: TrialEvent[] = [];
  now = Date.parse('2027-01-04T08:00:00.000Z');
  #ids = 0;

  constructor() {
    const created = createTrial(
      { code: 'WELL-99', title: 'A trial of tests', statisticianId: statistician.personId ?? '' },
      this.context(administrator),
    );
    this.state = created.state;
    this.events.push(...created.events);
  }

  context(actor: DecisionActor) {
    return {
      now: new Date(this.now).toISOString(),
      actor,
      newId: () => `id-${(this.#ids += 1)}`,
      sha256,
      softwareVersion: 'stepwell test',
    };
  }

  /** Decides a command without keeping what follows. */
  ask(actor: DecisionActor, command: TrialCommand): Decision {
    return decide(this.state, command, this.context(actor));
  }

  /** Decides a command and keeps what follows; throws on a refusal. */
  act(actor: DecisionActor, command: TrialCommand): TrialEvent['payload']['kind'][] {
    const decision = this.ask(actor, command);
    if (!decision.ok) throw new Error(decision.refusal.message);
    this.state = decision.state;
    this.events.push(...decision.events);
    return decision.events.map((event) => event.payload.kind);
  }

  pass(milliseconds: number): this {
    this.now += milliseconds;
    return this;
  }

  /** Two sites with a coordinator each, three reviewers, a sponsor, a monitor. */
  withTeam(): this {
    for (const siteId of [SITE_A, SITE_B]) this.act(administrator, { type: 'add-site', input: { siteId } });
    const grant = (actor: DecisionActor, siteIds: string[] = []) =>
      this.act(administrator, {
        type: 'grant-membership',
        input: {
          personId: actor.personId ?? '',
          role: actor.role as Exclude<Role, 'administrator' | 'system'>,
          siteIds,
        },
      });
    for (const reviewer of [firstReviewer, secondReviewer, thirdReviewer]) grant(reviewer);
    grant(coordinatorA, [SITE_A]);
    grant(coordinatorB, [SITE_B]);
    grant(sponsor);
    grant(monitor);
    return this;
  }

  withDesign(design: Design = testDesign): this {
    this.act(statistician, { type: 'save-design', input: { design } });
    return this;
  }

  get version() {
    const version = Object.values(this.state.designVersions)[0];
    if (!version) throw new Error('There is no design version.');
    return version;
  }

  approved(): this {
    this.act(statistician, { type: 'submit-design', input: { versionId: this.version.id } });
    this.act(firstReviewer, {
      type: 'approve-design',
      input: { versionId: this.version.id, seenDigest: this.version.digest },
    });
    return this;
  }

  get awaiting() {
    const awaiting = awaitingRecommendation(this.state);
    if (!awaiting) throw new Error('No recommendation waits.');
    return awaiting;
  }

  signCommand(
    decision: 'release' | 'return' | 'stop',
    { dose, reason }: { dose?: string | null; reason?: string | null } = {},
  ): TrialCommand & { type: 'sign-recommendation' } {
    return {
      type: 'sign-recommendation',
      input: {
        recommendationId: this.awaiting.id,
        seenDigest: this.awaiting.digest,
        decision,
        dose: decision === 'release' ? (dose ?? this.awaiting.dose) : null,
        reason: reason ?? null,
      },
    };
  }

  released(dose?: string): this {
    const reason = dose === undefined ? null : 'One more look at this dose first.';
    this.act(firstReviewer, this.signCommand('release', { dose: dose ?? null, reason }));
    this.act(secondReviewer, this.signCommand('release', { dose: dose ?? null, reason }));
    return this;
  }

  /** A trial with its first cohort open. */
  static opened(design: Design = testDesign): ConductTrial {
    return new ConductTrial().withTeam().withDesign(design).approved().released();
  }

  get cohort() {
    const cohort = currentCohort(this.state);
    if (!cohort) throw new Error('No cohort is open.');
    return cohort;
  }

  reserve(actor: DecisionActor, siteId: string, code: string): string {
    this.act(actor, { type: 'reserve-slot', input: { cohortId: this.cohort.id, siteId, code } });
    const subject = placesOf(this.state, this.cohort.id).find((each) => each.code === code);
    if (!subject) throw new Error('The place was not reserved.');
    return subject.id;
  }

  dose(
    actor: DecisionActor,
    subjectId: string,
    doseGiven = this.cohort.dose,
    deviationReason: string | null = null,
  ) {
    return this.act(actor, {
      type: 'record-dosing',
      input: { subjectId, dosedAt: new Date(this.now).toISOString(), doseGiven, deviationReason },
    });
  }

  /** Runs the open cohort of three: the first `responses` subjects respond on day 3, the others do not. */
  runCohort(responses: number): this {
    const number = this.cohort.number;
    const ids: string[] = [];
    for (let place = 1; place <= this.cohort.size; place += 1) {
      const [actor, siteId] =
        place === 2 ? ([coordinatorB, SITE_B] as const) : ([coordinatorA, SITE_A] as const);
      const id = this.reserve(actor, siteId, `AB-${number}${String(place).padStart(2, '0')}`);
      this.pass(HOUR).dose(actor, id);
      ids.push(id);
    }
    this.pass(29 * DAY);
    ids.forEach((subjectId, index) => {
      const subject = this.state.subjects[subjectId];
      const actor = subject?.siteId === SITE_B ? coordinatorB : coordinatorA;
      const isPresent = index < responses;
      this.act(actor, {
        type: 'record-outcome',
        input: {
          subjectId,
          outcome: isPresent ? 'present' : 'absent',
          onsetAt: isPresent ? new Date(Date.parse(subject?.dosedAt ?? '') + 3 * DAY).toISOString() : null,
        },
      });
    });
    return this;
  }
}
