import { z } from 'zod';
import { TRIAL_ROLES } from '@/lib/policy/roles';
import { designSchema } from './design';
import { doseSchema } from './dose';
import { plainText } from './text';

/** Longest texts people type in the conduct of a trial, the same in forms, actions and columns. */
export const TEXT_LIMITS = {
  reason: 2000,
  shortReason: 500,
  subjectCode: 24,
  password: 200,
  email: 254,
} as const;

const ID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;

export const idSchema = z
  .string({ error: 'The record is not named.' })
  .regex(ID, { error: 'The record is not named.' });

/** The id of a record a person chooses from a list; `advice` is said while none is chosen. */
export const chosenIdSchema = (advice: string) => z.string({ error: advice }).regex(ID, { error: advice });

/** An instant as ISO 8601 with its offset, read as UTC to the millisecond. */
export const instantSchema = z
  .string({ error: 'The time is missing. Enter a date and a time.' })
  .max(40, { error: 'This is not a date and time.' })
  .pipe(z.iso.datetime({ offset: true, error: 'This is not a date and time. Enter both.' }))
  .transform((text, context) => {
    const milliseconds = Date.parse(text);
    if (
      !Number.isFinite(milliseconds) ||
      milliseconds < Date.UTC(2000, 0, 1) ||
      milliseconds > Date.UTC(2200, 0, 1)
    ) {
      context.issues.push({
        code: 'custom',
        message: 'The year is not between 2000 and 2199. Check the date.',
        input: text,
      });
      return z.NEVER;
    }
    return new Date(milliseconds).toISOString();
  });

export const trialCodeSchema = z
  .string({ error: 'The trial is not named.' })
  .regex(/^[A-Z][A-Z0-9]*(-[A-Z0-9]+)*$/, {
    error: 'A trial code has capital letters and digits, in groups joined by hyphens, such as WELL-02.',
  })
  .min(3, { error: 'A trial code has 3 to 20 characters.' })
  .max(20, { error: 'A trial code has 3 to 20 characters.' });

const reasonSchema = plainText('The reason', TEXT_LIMITS.reason, { minimum: 5, lines: true });
const shortReasonSchema = plainText('The reason', TEXT_LIMITS.shortReason, { minimum: 5, lines: true });

/** E-mail address and password, typed again for a signature. */
export const credentialsSchema = {
  email: z
    .string({ error: 'Your e-mail address is missing.' })
    .trim()
    .min(1, { error: 'Your e-mail address is missing.' })
    .max(TEXT_LIMITS.email, { error: 'An e-mail address has at most 254 characters.' }),
  password: z
    .string({ error: 'Your password is missing.' })
    .min(1, { error: 'Your password is missing.' })
    .max(TEXT_LIMITS.password, { error: 'A password has at most 200 characters.' }),
};

export const subjectCodeSchema = z
  .string({ error: 'The subject code is missing.' })
  .trim()
  .regex(/^[A-Z0-9]{2,12}-[0-9]{2,6}$/, {
    error:
      'A subject code is the site’s code, a hyphen and a number, such as ALD-014: no name, no birth date.',
  });

const outcomeFields = {
  outcome: z.enum(['present', 'absent'], { error: 'Choose the outcome.' }),
  onsetAt: instantSchema.nullable().default(null),
};

/** An outcome that is present has a time when it began. */
function checkOnset(
  input: { readonly outcome: 'present' | 'absent'; readonly onsetAt: string | null },
  context: z.RefinementCtx,
): void {
  if (input.outcome === 'present' && input.onsetAt === null) {
    context.addIssue({ code: 'custom', path: ['onsetAt'], message: 'Enter when it began.' });
  }
}

/** The input of every command of a trial, keyed by the command's type. */
export const trialInputSchemas = {
  'save-design': z.strictObject({ design: designSchema }),
  'submit-design': z.strictObject({ versionId: idSchema }),
  'return-design': z.strictObject({ versionId: idSchema, reason: reasonSchema }),
  'approve-design': z.strictObject({ versionId: idSchema, seenDigest: z.string().length(64) }),
  'sign-recommendation': z
    .strictObject({
      recommendationId: idSchema,
      seenDigest: z.string().length(64),
      decision: z.enum(['release', 'return', 'stop'], { error: 'Choose a decision.' }),
      dose: doseSchema.nullable().default(null),
      reason: reasonSchema.nullable().default(null),
    })
    .superRefine((input, context) => {
      if (input.decision === 'release' && input.dose === null) {
        context.addIssue({ code: 'custom', path: ['dose'], message: 'Choose the dose to release.' });
      }
      if (input.decision !== 'release' && input.reason === null) {
        context.addIssue({
          code: 'custom',
          path: ['reason'],
          message: 'Give the reason; it is kept with your signature.',
        });
      }
    }),
  'halt-trial': z.strictObject({ reason: reasonSchema }),
  'sign-lift': z.strictObject({
    haltId: idSchema,
    plan: z.enum(['continue', 'close-short'], { error: 'Say what becomes of the open cohort.' }),
    reason: reasonSchema,
  }),
  'reserve-slot': z.strictObject({
    cohortId: idSchema,
    siteId: chosenIdSchema('Choose the site.'),
    code: subjectCodeSchema,
  }),
  'release-slot': z.strictObject({ subjectId: idSchema, reason: shortReasonSchema }),
  'record-dosing': z.strictObject({
    subjectId: idSchema,
    dosedAt: instantSchema,
    doseGiven: doseSchema,
    deviationReason: shortReasonSchema.nullable().default(null),
  }),
  'record-outcome': z
    .strictObject({
      subjectId: idSchema,
      ...outcomeFields,
    })
    .superRefine(checkOnset),
  'correct-outcome': z
    .strictObject({
      subjectId: idSchema,
      seenRevision: z.number().int().min(1),
      ...outcomeFields,
      reason: shortReasonSchema,
    })
    .superRefine(checkOnset),
  'resubmit-cohort': z.strictObject({ cohortId: idSchema }),
  'add-site': z.strictObject({ siteId: chosenIdSchema('Choose a site.') }),
  'grant-membership': z.strictObject({
    personId: chosenIdSchema('Choose a person.'),
    role: z.enum(TRIAL_ROLES, { error: 'Choose a role.' }),
    siteIds: z.array(idSchema).max(100).default([]),
  }),
  'end-membership': z.strictObject({ personId: idSchema }),
} as const;

export type TrialInputSchemas = typeof trialInputSchemas;
export type TrialCommandType = keyof TrialInputSchemas;
/** What a command carries once parsed. */
export type TrialInput<Type extends TrialCommandType> = z.output<TrialInputSchemas[Type]>;

/** The commands that are electronic signatures: address and password are asked for again. */
export const SIGNED_COMMANDS: readonly TrialCommandType[] = [
  'approve-design',
  'sign-recommendation',
  'sign-lift',
];
