'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { SelectField } from '@/components/forms/choice-fields';
import { installationSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextField } from '@/components/forms/text-field';
import { useActionForm } from '@/components/forms/use-action-form';
import type { ActionResult, Submission } from '@/lib/schemas/action-result';

const schema = installationSchema('create-trial');

type Input = { code: unknown; title: string; statisticianId: string } & Submission;

/** Creates a trial: its code, its title and the statistician who takes it from there. */
export function TrialForm({
  people,
  action,
}: {
  people: { value: string; label: string }[];
  action: (input: Input) => Promise<ActionResult<{ code: string }>>;
}) {
  const router = useRouter();
  const state = useActionForm({
    schema,
    action,
    defaultValues: { code: '', title: '', statisticianId: '' },
    onSaved: ({ code }) => router.push(`/administration/trials/${code}`),
  });
  return (
    <div className="max-w-md">
      <ActionForm state={state} label="Create a trial">
        <TextField
          name="code"
          label="Code"
          mono
          autoCapitalize="characters"
          autoComplete="off"
          help="Capital letters and digits in groups joined by hyphens, such as WELL-02. It is part of the trial’s addresses and does not change."
        />
        <TextField
          name="title"
          label="Title"
          autoComplete="off"
          help="As the protocol has it, in 5 to 200 characters."
        />
        <SelectField
          name="statisticianId"
          label="First statistician"
          prompt="Choose a person"
          choices={people}
          help="Writes the design. Administrators are not offered: they hold no role in a trial."
        />
        <div className="max-md:grid">
          <SubmitButton pendingLabel="Creating…">Create trial</SubmitButton>
        </div>
      </ActionForm>
    </div>
  );
}
