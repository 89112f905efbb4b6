import { z } from 'zod';
import { TRIAL_ROLES } from '@/lib/policy/roles';

const id = z.string().min(1).max(36);
const instant = z.iso.datetime({ precision: 3 });
const dose = z.string().regex(/^\d{1,10}(\.\d{1,10})?$/);
const text = (length: number) => z.string().max(length);
const digest = z.string().regex(/^[0-9a-f]{64}$/);
const outcome = z.enum(['present', 'absent', 'not-evaluable']);

const event = <Kind extends string, Shape extends z.ZodRawShape>(kind: Kind, shape: Shape) =>
  z.strictObject({ kind: z.literal(kind), ...shape });

/** The outcome fields a correction may change, before and after. */
const outcomeFields = z.strictObject({
  outcome: outcome.nullable(),
  onsetAt: instant.nullable(),
  grade: z.number().int().min(1).max(5).nullable(),
});

/**
 * The payload of every event of a trial's chain: one discriminated union, checked on the way into the trail
 * and on the way out. No names of people: ids only, and printed names in signatures, where the law asks for them.
 */
export const trialEventSchema = z.discriminatedUnion('kind', [
  event('trial-created', { trialId: id, code: text(20), title: text(200), quorum: z.number().int().min(1) }),
  event('site-added', { siteId: id, state: z.enum(['planned', 'active', 'suspended', 'closed']) }),
  event('member-granted', {
    membershipId: id,
    personId: id,
    role: z.enum(TRIAL_ROLES),
    siteIds: z.array(id),
  }),
  event('member-ended', { personId: id }),
  event('design-saved', { versionId: id, number: z.number().int(), design: text(200_000), digest }),
  event('design-submitted', { versionId: id }),
  event('design-returned', { versionId: id, reason: text(2000) }),
  event('design-approved', { versionId: id }),
  event('recommendation-computed', {
    recommendationId: id,
    number: z.number().int(),
    revision: z.number().int(),
    designVersionId: id,
    outcome: z.enum(['dose', 'stop']),
    dose: dose.nullable(),
    closedFrom: dose.nullable(),
    record: text(2_000_000),
    digest,
    softwareVersion: text(60),
  }),
  event('signed', {
    signatureId: id,
    recommendationId: id.nullable(),
    designVersionId: id.nullable(),
    haltId: id.nullable(),
    printedName: text(120),
    decision: z.enum(['release', 'return', 'stop', 'approve', 'continue', 'close-short']),
    dose: dose.nullable(),
    reason: text(2000).nullable(),
    meaning: text(500),
    signedText: text(20_000),
    digest,
  }),
  event('dose-released', {
    releaseId: id,
    recommendationId: id,
    cohortNumber: z.number().int(),
    recommendedDose: dose,
    dose,
  }),
  event('trial-opened', {}),
  event('cohort-opened', {
    cohortId: id,
    number: z.number().int(),
    size: z.number().int(),
    designVersionId: id,
    releaseId: id,
    dose,
  }),
  event('slot-reserved', {
    subjectId: id,
    cohortId: id,
    cohortSize: z.number().int(),
    place: z.number().int(),
    siteId: id,
    code: text(24),
  }),
  event('slot-released', { subjectId: id, reason: text(500) }),
  event('dosing-recorded', {
    subjectId: id,
    dosedAt: instant,
    doseGiven: dose,
    windowEndsAt: instant,
    deviationReason: text(500).nullable(),
  }),
  event('outcome-recorded', {
    subjectId: id,
    outcome,
    onsetAt: instant.nullable(),
    grade: z.number().int().min(1).max(5).nullable(),
  }),
  event('outcome-corrected', {
    subjectId: id,
    before: outcomeFields,
    after: outcomeFields,
    reason: text(500),
  }),
  event('cohort-completed', { cohortId: id }),
  event('cohort-closed-short', { cohortId: id, cancelledSubjectIds: z.array(id) }),
  event('recommendation-returned', { recommendationId: id }),
  event('recommendation-superseded', { recommendationId: id }),
  event('recommendation-overtaken', { recommendationId: id }),
  event('trial-halted', { haltId: id, reason: text(2000) }),
  event('trial-lifted', { haltId: id, plan: z.enum(['continue', 'close-short']) }),
  event('trial-closed', { recommendationId: id.nullable() }),
]);

export type TrialEventPayload = z.infer<typeof trialEventSchema>;
export type TrialEventKind = TrialEventPayload['kind'];

/** Version of the payload schema stored beside each payload. */
export const TRIAL_EVENT_SCHEMA_VERSION = 1;

/** An event as decided: who, in which role, when, what. Its place in the chain is given when it is stored. */
export interface TrialEvent {
  readonly occurredAt: string;
  /** Null for what the server does by itself. */
  readonly personId: string | null;
  readonly role: string;
  readonly payload: TrialEventPayload;
}
