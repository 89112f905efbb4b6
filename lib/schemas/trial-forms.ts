import type { z } from 'zod';
import type { Submission } from './action-result';
import {
  credentialsSchema,
  SIGNED_COMMANDS,
  trialCodeSchema,
  type TrialCommandType,
  trialInputSchemas,
  type TrialInputSchemas,
} from './trial-inputs';

const trialFields = { trialCode: trialCodeSchema };
const signedFields = { ...trialFields, ...credentialsSchema };

type Named<Shape extends z.ZodRawShape> = z.ZodObject<Shape & typeof trialFields, z.core.$strict>;
type Signed<Shape extends z.ZodRawShape> = z.ZodObject<Shape & typeof signedFields, z.core.$strict>;

/** The commands that are electronic signatures, as a type. */
export type SignedCommandType = 'approve-design' | 'sign-recommendation' | 'sign-lift';

/** What each form of a trial holds, flat: the command's fields, the trial's code, and for signatures the credentials. */
export type TrialFormSchemas = {
  [Type in TrialCommandType]: TrialInputSchemas[Type] extends z.ZodObject<infer Shape extends z.ZodRawShape>
    ? Type extends SignedCommandType
      ? Signed<Shape>
      : Named<Shape>
    : never;
};

/**
 * The schema of each form of a trial: the command's own, refinements kept, and flat beside it `trialCode`, and `email`
 * and `password` where the command is a signature. The same for the form, its action and the route.
 */
export const trialFormSchemas = Object.fromEntries(
  Object.entries(trialInputSchemas).map(([type, schema]) => [
    type,
    (schema as z.ZodObject).safeExtend(
      SIGNED_COMMANDS.includes(type as TrialCommandType) ? signedFields : trialFields,
    ),
  ]),
) as unknown as TrialFormSchemas;

/** What a form of a trial sends: its fields as typed, and the key of the submission. */
export type TrialFormInput<Type extends TrialCommandType> = z.input<TrialFormSchemas[Type]> & Submission;
