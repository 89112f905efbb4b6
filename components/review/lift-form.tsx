'use client';

import { useRouter } from 'next/navigation';
import { useWatch } from 'react-hook-form';
import { ActionForm } from '@/components/forms/action-form';
import { RadioGroup } from '@/components/forms/choice-fields';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { PasswordField } from '@/components/forms/password-field';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextArea, TextField } from '@/components/forms/text-field';
import { type FormAction, useActionForm } from '@/components/forms/use-action-form';
import type { TrialFormSchemas } from '@/lib/schemas/trial-forms';

const schema = trialSchema('sign-lift');

/** Signing the lifting of a halt, with the plan for the open cohort. */
export function LiftForm({
  trialCode,
  haltId,
  cohortNumber,
  printedName,
  standing,
  quorum,
  action,
}: {
  trialCode: string;
  haltId: string;
  /** The open cohort the plan is for; null when none is open. */
  cohortNumber: number | null;
  printedName: string;
  /** Signatures of others that stand on each plan. */
  standing: Readonly<Record<'continue' | 'close-short', number>>;
  quorum: number;
  action: FormAction<TrialFormSchemas['sign-lift'], unknown>;
}) {
  const router = useRouter();
  const state = useActionForm({
    schema,
    action,
    defaultValues: { trialCode, haltId, plan: 'continue', reason: '', email: '', password: '' },
    onSaved: () => router.refresh(),
  });
  const plan = useWatch({ control: state.form.control, name: 'plan' });
  const count = standing[plan] + 1;
  const words =
    plan === 'continue' ? 'the open cohort continues at its dose' : 'the open cohort is closed short';
  return (
    <ActionForm state={state} label="Lift the halt" saved="Signed.">
      {cohortNumber === null ? null : (
        <RadioGroup
          name="plan"
          label={`Cohort ${cohortNumber}`}
          choices={[
            {
              value: 'continue',
              label: 'Continue at its dose',
              help: 'Free places open again; subjects in their window are followed as before.',
            },
            {
              value: 'close-short',
              label: 'Close it short',
              help: 'Undosed places are cancelled; every dosed subject is waited for.',
            },
          ]}
        />
      )}
      <TextArea name="reason" label="Reason" help="Kept with your signature." rows={3} />
      <div className="grid gap-x-9 gap-y-4 md:grid-cols-2">
        <TextField name="email" label="Your e-mail address" type="email" autoComplete="off" />
        <PasswordField name="password" label="Your password" autoComplete="off" />
      </div>
      <p className="max-w-prose">
        By signing, {printedName} states: “I lift the halt of {trialCode}; {words}.”
      </p>
      <div>
        <SubmitButton pendingLabel="Signing…">
          {count >= quorum ? 'Sign and lift the halt' : `Sign to lift the halt (${count} of ${quorum})`}
        </SubmitButton>
      </div>
    </ActionForm>
  );
}
