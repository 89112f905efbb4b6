import { z } from 'zod';
import { doseSchema } from './dose';
import { trialCodeSchema } from './trial-inputs';
import { unitSchema } from './units';

const id = z.string().min(1).max(36);
const count = z.number().int().min(1).max(65_535);
const instant = z.iso.datetime({ precision: 3 });

/** What every mail about a trial carries: which trial, when the thing happened, and the head of the trial's chain then. */
const notice = <Kind extends string, Shape extends z.ZodRawShape>(kind: Kind, shape: Shape) =>
  z.strictObject({
    kind: z.literal(kind),
    trialCode: trialCodeSchema,
    occurredAt: instant,
    chainHead: z.string().regex(/^[0-9a-f]{64}$/),
    ...shape,
  });

const releasedDose = {
  releaseId: id,
  cohortNumber: count,
  dose: doseSchema,
  unit: unitSchema,
  doseNotation: z.enum(['plain', 'powers-of-ten']),
};

const link = <Kind extends string>(kind: Kind) =>
  z.strictObject({
    kind: z.literal(kind),
    purpose: z.literal(kind),
    token: z.string().regex(/^[A-Za-z0-9_-]{16,200}$/),
    expiresAt: instant,
  });

/** The mails a trial's events bring about. None holds a subject code, a grade or a text a person typed. */
export const trialNoticeSchema = z.discriminatedUnion('kind', [
  notice('design-submitted', { versionId: id, designVersion: count }),
  notice('design-returned', { versionId: id, designVersion: count }),
  notice('recommendation-ready', { recommendationId: id, afterCohort: count.nullable() }),
  notice('dose-released', {
    ...releasedDose,
    cohortSize: count,
    designVersion: count,
    signers: z.array(z.string().min(1).max(120)).max(50),
  }),
  notice('dose-released-summary', releasedDose),
  notice('packet-returned', { cohortNumber: count }),
  notice('trial-halted', { haltId: id }),
  notice('trial-lifted', { haltId: id }),
  notice('trial-closed', {}),
]);

/** The mails of the installation, each with the token of a link that works once. */
export const linkMailSchema = z.discriminatedUnion('kind', [link('invitation'), link('password-reset')]);

/** The payload of every mail in the outbox: one definition, checked when it is queued and when it is sent. */
export const mailPayloadSchema = z.discriminatedUnion('kind', [trialNoticeSchema, linkMailSchema]);

export type TrialNotice = z.output<typeof trialNoticeSchema>;
export type LinkMail = z.output<typeof linkMailSchema>;
export type MailPayload = z.output<typeof mailPayloadSchema>;
export type MailKind = MailPayload['kind'];
/** The payload of one kind of mail. */
export type MailPayloadOf<Kind extends MailKind> = Extract<MailPayload, { kind: Kind }>;

type WithoutChainHead<T> = T extends unknown ? Omit<T, 'chainHead'> : never;
/** A trial's notice before its events are stored: the chain's head after them is not known yet. */
export type UnchainedNotice = WithoutChainHead<TrialNotice>;

/** Every kind of mail there is. */
export const MAIL_KINDS: readonly MailKind[] = mailPayloadSchema.options.flatMap((union) =>
  union.options.map((option) => option.shape.kind.value),
);

/**
 * The payload of a mail as it stands in the outbox.
 * @param kind the mail's kind, as its row says
 * @param payload what the row holds, parsed from JSON
 * @throws z.ZodError when there is no such kind, or the payload is not one of it
 */
export function parseMailPayload(kind: string, payload: unknown): MailPayload {
  const fields = typeof payload === 'object' && payload !== null ? payload : {};
  return mailPayloadSchema.parse({ ...fields, kind });
}
