'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { ActionForm } from '@/components/forms/action-form';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextArea } from '@/components/forms/text-field';
import { type FormAction, useActionForm } from '@/components/forms/use-action-form';
import { Button } from '@/components/ui/button';
import type { TrialFormSchemas } from '@/lib/schemas/trial-forms';

const schema = trialSchema('return-design');

/** Sends a submitted design back to draft, with a reason; the reason is asked for once the act is chosen. */
export function ReturnDesignForm({
  trialCode,
  versionId,
  action,
}: {
  trialCode: string;
  versionId: string;
  action: FormAction<TrialFormSchemas['return-design'], unknown>;
}) {
  const router = useRouter();
  const [isOpen, setOpen] = useState(false);
  const state = useActionForm({
    schema,
    action,
    defaultValues: { trialCode, versionId, reason: '' },
    onSaved: () => router.refresh(),
  });
  if (!isOpen) return <Button onClick={() => setOpen(true)}>Return to draft</Button>;
  return (
    <ActionForm state={state} label="Return the design to draft" saved="Returned.">
      <TextArea
        name="reason"
        label="Reason"
        help="The statistician reads it on this page and in an e-mail’s link."
        rows={3}
      />
      <div className="flex flex-wrap gap-3">
        <SubmitButton variant="secondary" pendingLabel="Returning…">
          Return to draft
        </SubmitButton>
        <Button variant="quiet" onClick={() => setOpen(false)}>
          Keep it in review
        </Button>
      </div>
    </ActionForm>
  );
}
