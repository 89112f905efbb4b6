'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { PasswordField } from '@/components/forms/password-field';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextField } from '@/components/forms/text-field';
import { type FormAction, useActionForm } from '@/components/forms/use-action-form';
import type { TrialFormSchemas } from '@/lib/schemas/trial-forms';

const schema = trialSchema('approve-design');

/** The version that is decided on, and its digest as read. */
export interface DesignReference {
  readonly trialCode: string;
  readonly versionId: string;
  readonly seenDigest: string;
  readonly number: number;
}

/** Approves a submitted design by signature. */
export function ApproveDesignForm({
  version,
  printedName,
  meaning,
  action,
}: {
  version: DesignReference;
  printedName: string;
  /** The sentence the signer states. */
  meaning: string;
  action: FormAction<TrialFormSchemas['approve-design'], unknown>;
}) {
  const router = useRouter();
  const { trialCode, versionId, seenDigest, number } = version;
  const state = useActionForm({
    schema,
    action,
    defaultValues: { trialCode, versionId, seenDigest, email: '', password: '' },
    onSaved: () => router.refresh(),
  });
  return (
    <ActionForm state={state} label="Approve the design" saved="Approved.">
      <div className="grid gap-x-9 gap-y-4 md:grid-cols-2">
        <TextField name="email" label="Your e-mail address" type="email" autoComplete="off" />
        <PasswordField name="password" label="Your password" autoComplete="off" />
      </div>
      <p className="max-w-prose">
        By signing, {printedName} states: “{meaning}”
      </p>
      <div>
        <SubmitButton pendingLabel="Signing…">Sign and approve version {number}</SubmitButton>
      </div>
    </ActionForm>
  );
}
