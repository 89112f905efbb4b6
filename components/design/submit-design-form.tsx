'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { type FormAction, useActionForm } from '@/components/forms/use-action-form';
import type { TrialFormSchemas } from '@/lib/schemas/trial-forms';

const schema = trialSchema('submit-design');

/** Puts the draft up for approval. @param why why that is not possible now; null when it is */
export function SubmitDesignForm({
  trialCode,
  versionId,
  why,
  action,
}: {
  trialCode: string;
  versionId: string;
  why: string | null;
  action: FormAction<TrialFormSchemas['submit-design'], unknown>;
}) {
  const router = useRouter();
  const state = useActionForm({
    schema,
    action,
    defaultValues: { trialCode, versionId },
    onSaved: () => router.refresh(),
  });
  return (
    <ActionForm state={state} label="Submit the design">
      <div>
        <SubmitButton pendingLabel="Submitting…" disabledReason={why ?? undefined}>
          Submit for approval
        </SubmitButton>
      </div>
    </ActionForm>
  );
}
