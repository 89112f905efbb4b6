import { z } from 'zod';
import { emailSchema } from './email';
import { printedNameSchema } from './installation-inputs';
import { newPasswordSchema } from './password';

/** What the form of each kind of single-use link asks for, beside the link's token. */
export const setPasswordSchema = {
  'first-administrator': z.strictObject({
    email: emailSchema,
    printedName: printedNameSchema,
    password: newPasswordSchema,
  }),
  invitation: z.strictObject({ printedName: printedNameSchema, password: newPasswordSchema }),
  'password-reset': z.strictObject({ password: newPasswordSchema }),
} as const;
