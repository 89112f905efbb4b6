import { z } from 'zod';
import { SIGN_CHOICES } from './sign-decision-input';
import { credentialsSchema, TEXT_LIMITS } from './trial-inputs';

/**
 * The decision as a reviewer fills it in: one choice, the lower dose and the reason where the choice asks for them, and
 * the credentials. `decisionInput` turns it into the command's own input, which the server checks again in full.
 */
export const signDecisionFormSchema = z
  .strictObject({
    choice: z.enum(SIGN_CHOICES, { error: 'Choose a decision.' }),
    dose: z.string().max(40),
    reason: z.string().max(TEXT_LIMITS.reason * 2, { error: 'The reason has at most 2000 characters.' }),
    ...credentialsSchema,
  })
  .superRefine((form, context) => {
    if (form.choice === 'lower' && form.dose === '') {
      context.addIssue({ code: 'custom', path: ['dose'], message: 'Choose the dose to release.' });
    }
    if (form.choice !== 'recommended' && form.reason.trim().length < 5) {
      context.addIssue({
        code: 'custom',
        path: ['reason'],
        message: 'Give the reason; it is kept with your signature.',
      });
    }
  });

export type SignDecisionForm = z.input<typeof signDecisionFormSchema>;
