'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { SubmitButton } from '@/components/forms/submit-button';
import { useActionForm } from '@/components/forms/use-action-form';
import type { ActionResult } from '@/lib/schemas/action-result';

/** Ends another session of one's own. */
export function EndSessionForm({
  sessionId,
  begun,
  action,
}: {
  sessionId: string;
  /** When it began, in words, to tell one from another. */
  begun: string;
  action: (input: { sessionId: string; submissionKey: string }) => Promise<ActionResult>;
}) {
  const router = useRouter();
  const state = useActionForm({
    schema: () => import('@/lib/schemas/account').then((module) => module.endSessionSchema),
    action,
    defaultValues: { sessionId },
    onSaved: () => router.refresh(),
  });
  return (
    <ActionForm state={state} label={`End the session begun ${begun}`}>
      <SubmitButton variant="secondary" small pendingLabel="Ending…">
        End
      </SubmitButton>
    </ActionForm>
  );
}
