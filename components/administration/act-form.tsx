'use client';

import { useRouter } from 'next/navigation';
import type { z } from 'zod';
import { ActionForm } from '@/components/forms/action-form';
import { SubmitButton } from '@/components/forms/submit-button';
import { useActionForm } from '@/components/forms/use-action-form';
import type { ButtonVariant } from '@/components/ui/button';
import type { ActionResult, Submission } from '@/lib/schemas/action-result';

/**
 * An act on one record that needs no entries: a button that says what it does, and the answer beside it. What the act
 * changed is read anew.
 * @param values the ids the act takes
 * @param name what screen readers call it, with the record's name
 * @param saved what is said once it is done
 */
export function ActForm<Values extends Record<string, string>>({
  schema,
  values,
  action,
  name,
  label,
  pendingLabel,
  saved,
  variant,
  small,
}: {
  schema: z.ZodType<unknown, Values>;
  values: Values;
  action: (input: Values & Submission) => Promise<ActionResult<unknown>>;
  name: string;
  label: string;
  pendingLabel: string;
  saved?: string;
  variant?: ButtonVariant;
  small?: boolean;
}) {
  const router = useRouter();
  const state = useActionForm({
    schema,
    action,
    defaultValues: values as never,
    onSaved: () => router.refresh(),
  });
  return (
    <ActionForm state={state} label={name} saved={saved} className="grid justify-items-start gap-2">
      <SubmitButton variant={variant} small={small} pendingLabel={pendingLabel}>
        {label}
      </SubmitButton>
    </ActionForm>
  );
}
