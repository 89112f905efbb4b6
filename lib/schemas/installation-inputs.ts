import { z } from 'zod';
import { emailSchema } from './email';
import { newPasswordSchema } from './password';
import { plainText } from './text';
import { chosenIdSchema, idSchema, trialCodeSchema } from './trial-inputs';

/** Longest texts of people, sites and trials, the same in forms, actions and columns. */
export const INSTALLATION_LIMITS = {
  printedName: 120,
  siteName: 120,
  timeZone: 64,
  trialTitle: 200,
} as const;

/** A person's name as it stands beside their signatures. */
export const printedNameSchema = plainText('The printed name', INSTALLATION_LIMITS.printedName, {
  minimum: 2,
});

export const siteCodeSchema = z
  .string({ error: 'The code is missing. Enter 2 to 12 capital letters and digits.' })
  .max(100, { error: 'A site code has 2 to 12 capital letters and digits, such as ALD.' })
  .transform((text) => text.trim())
  .pipe(
    z.string().regex(/^[A-Z0-9]{2,12}$/, {
      error: 'A site code has 2 to 12 capital letters and digits, such as ALD; subject codes begin with it.',
    }),
  );

const ZONE_ADVICE = 'Choose one such as Europe/Vienna.';

/** The zone's own spelling when the runtime knows it, else null. */
function knownTimeZone(text: string): string | null {
  if (!/^[A-Za-z][A-Za-z0-9_+-]*(\/[A-Za-z0-9_+-]+){0,2}$/.test(text)) return null;
  try {
    const { timeZone } = new Intl.DateTimeFormat('en', { timeZone: text }).resolvedOptions();
    return timeZone.toLowerCase() === text.toLowerCase() ? timeZone : text;
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}

/** A time zone of the IANA database, as the runtime knows it. */
export const timeZoneSchema = z
  .string({ error: `The time zone is missing. ${ZONE_ADVICE}` })
  .max(INSTALLATION_LIMITS.timeZone, { error: `This is not a time zone. ${ZONE_ADVICE}` })
  .transform((text, context) => {
    const zone = knownTimeZone(text.trim());
    if (zone !== null) return zone;
    context.issues.push({
      code: 'custom',
      message:
        text.trim() === ''
          ? `The time zone is missing. ${ZONE_ADVICE}`
          : `This time zone is not known. ${ZONE_ADVICE}`,
      input: text,
    });
    return z.NEVER;
  });

/** The token of a single-use link: 256 random bits in base64url. */
export const linkTokenSchema = z
  .string({ error: 'This link is not known. Check that the whole address was copied.' })
  .regex(/^[A-Za-z0-9_-]{43}$/, {
    error: 'This link is not known. Check that the whole address was copied.',
  });

const personIdSchema = z.strictObject({ personId: idSchema });

/** The input of every command on the installation. */
export const installationInputSchemas = {
  'invite-person': z.strictObject({
    email: emailSchema,
    printedName: printedNameSchema,
    isAdministrator: z.boolean({ error: 'Say whether this person administers the installation.' }),
  }),
  'resend-invitation': personIdSchema,
  'reset-by-administrator': personIdSchema,
  'disable-person': personIdSchema,
  'enable-person': personIdSchema,
  'request-password-reset': z.strictObject({ email: emailSchema }),
  /** `email` and `printedName` for the first administrator; an invited person may correct their printed name. */
  'accept-link': z.strictObject({
    token: linkTokenSchema,
    printedName: printedNameSchema.optional(),
    email: emailSchema.optional(),
    password: newPasswordSchema,
  }),
  'create-site': z.strictObject({
    code: siteCodeSchema,
    name: plainText('The name of the site', INSTALLATION_LIMITS.siteName, { minimum: 2 }),
    timeZone: timeZoneSchema,
  }),
  'create-trial': z.strictObject({
    code: z.preprocess((value) => (typeof value === 'string' ? value.trim() : value), trialCodeSchema),
    title: plainText('The title', INSTALLATION_LIMITS.trialTitle, { minimum: 5 }),
    statisticianId: chosenIdSchema('Choose the first statistician; they write the design.'),
  }),
  'retry-mail': z.strictObject({ mailId: idSchema }),
} as const;

export type InstallationInputSchemas = typeof installationInputSchemas;
export type InstallationCommandType = keyof InstallationInputSchemas;
/** What a command on the installation carries once parsed. */
export type InstallationInput<Type extends InstallationCommandType> = z.output<
  InstallationInputSchemas[Type]
>;
