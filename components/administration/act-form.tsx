'use client';

import { useRouter } from 'next/navigation';
import type { z } from 'zod';
import { ActionForm } from '@/components/forms/action-form';
import { installationSchema, trialSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { useActionForm } from '@/components/forms/use-action-form';
import type { ButtonVariant } from '@/components/ui/button';
import type { ActionResult, Submission } from '@/lib/schemas/action-result';
import type { InstallationInputSchemas } from '@/lib/schemas/installation-inputs';
import type { TrialFormSchemas } from '@/lib/schemas/trial-forms';

/** The acts that need no entries, each with how to fetch the schema its action parses with. */
const SCHEMAS = {
  'resend-invitation': installationSchema('resend-invitation'),
  'reset-by-administrator': installationSchema('reset-by-administrator'),
  'disable-person': installationSchema('disable-person'),
  'enable-person': installationSchema('enable-person'),
  'retry-mail': installationSchema('retry-mail'),
  'end-membership': trialSchema('end-membership'),
} as const;

type Acts = Pick<InstallationInputSchemas & TrialFormSchemas, keyof typeof SCHEMAS>;
type Input<Act extends keyof Acts> = z.input<Acts[Act]>;

/**
 * An act on one record that needs no entries: a button that says what it does, and the answer beside it. What the act
 * changed is read anew.
 * @param values the ids the act takes
 * @param name what screen readers call it, with the record's name
 * @param saved what is said once it is done
 */
export function ActForm<Act extends keyof Acts>({
  act,
  values,
  action,
  name,
  label,
  pendingLabel,
  saved,
  variant = 'secondary',
  small,
}: {
  act: Act;
  values: Input<Act>;
  action: (input: Input<Act> & Submission) => Promise<ActionResult<unknown>>;
  name: string;
  label: string;
  pendingLabel: string;
  saved?: string;
  variant?: ButtonVariant;
  small?: boolean;
}) {
  const router = useRouter();
  const state = useActionForm({
    schema: SCHEMAS[act] as unknown as () => Promise<z.ZodType<Input<Act>, Input<Act>>>,
    action,
    defaultValues: values as never,
    onSaved: () => router.refresh(),
  });
  return (
    // A form takes no width of its own in a cell of a table; this gives it the button's.
    <div className={small ? 'min-w-28' : undefined}>
      <ActionForm state={state} label={name} saved={saved} className="grid justify-items-start gap-2">
        <SubmitButton variant={variant} small={small} pendingLabel={pendingLabel}>
          {label}
        </SubmitButton>
      </ActionForm>
    </div>
  );
}
