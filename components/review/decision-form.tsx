'use client';

import { useRouter } from 'next/navigation';
import { useWatch } from 'react-hook-form';
import { ActionForm } from '@/components/forms/action-form';
import { RadioGroup, SelectField } from '@/components/forms/choice-fields';
import { PasswordField } from '@/components/forms/password-field';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextArea, TextField } from '@/components/forms/text-field';
import { useActionForm } from '@/components/forms/use-action-form';
import type { ActionResult } from '@/lib/schemas/action-result';
import { decisionInput, type PacketReference, type SignChoice } from '@/lib/schemas/sign-decision-input';
import type { TrialFormInput } from '@/lib/schemas/trial-forms';

/** A decision as the form offers it. */
export interface OfferedDecision {
  readonly choice: SignChoice;
  /** What choosing it means, beside the radio button. */
  readonly label: string;
  readonly consequence: string;
  /** The sentence the signer states, and the words of the button, per dose (one entry without a dose: ""). */
  readonly byDose: Readonly<Record<string, { readonly meaning: string; readonly button: string }>>;
}

/** The decision of a reviewer, signed with address and password. */
export function DecisionForm({
  packet,
  decisions,
  lowerDoses,
  printedName,
  action,
}: {
  packet: PacketReference;
  decisions: readonly OfferedDecision[];
  lowerDoses: readonly { readonly value: string; readonly label: string }[];
  printedName: string;
  action: (input: TrialFormInput<'sign-recommendation'>) => Promise<ActionResult<unknown>>;
}) {
  const router = useRouter();
  const state = useActionForm({
    schema: () => import('@/lib/schemas/sign-decision-form').then((module) => module.signDecisionFormSchema),
    action: (form) => action(decisionInput(packet, form)),
    defaultValues: {
      choice: decisions[0]?.choice ?? 'return',
      dose: lowerDoses[0]?.value ?? '',
      reason: '',
      email: '',
      password: '',
    },
    onSaved: () => router.refresh(),
  });
  const [choice, dose] = useWatch({ control: state.form.control, name: ['choice', 'dose'] });
  const chosen = decisions.find((each) => each.choice === choice);
  const words = chosen && (chosen.byDose[choice === 'lower' ? dose : ''] ?? Object.values(chosen.byDose)[0]);
  return (
    <ActionForm state={state} label="Your decision" saved="Signed.">
      <RadioGroup
        name="choice"
        label="Decision"
        labelHidden
        choices={decisions.map(({ choice: value, label, consequence }) => ({
          value,
          label,
          help: consequence,
        }))}
      />
      {choice === 'lower' ? (
        <SelectField name="dose" label="Dose to release" choices={[...lowerDoses]} />
      ) : null}
      {choice === 'recommended' ? null : (
        <TextArea
          name="reason"
          label="Reason"
          help="Kept with your signature and shown to the trial."
          rows={3}
        />
      )}
      <div className="grid gap-x-9 gap-y-4 md:grid-cols-2">
        <TextField name="email" label="Your e-mail address" type="email" autoComplete="off" />
        <PasswordField name="password" label="Your password" autoComplete="off" />
      </div>
      {words ? (
        <p className="max-w-prose">
          By signing, {printedName} states: “{words.meaning}”
        </p>
      ) : null}
      <div>
        <SubmitButton pendingLabel="Signing…">{words?.button ?? 'Sign'}</SubmitButton>
      </div>
    </ActionForm>
  );
}
