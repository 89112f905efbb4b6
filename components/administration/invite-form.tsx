'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { Checkbox } from '@/components/forms/checkbox-fields';
import { installationSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextField } from '@/components/forms/text-field';
import { useActionForm } from '@/components/forms/use-action-form';
import type { ActionResult, Submission } from '@/lib/schemas/action-result';

const schema = installationSchema('invite-person');

type Input = { email: string; printedName: string; isAdministrator: boolean } & Submission;

/** Invites a person: name, address, and whether they administer the installation. */
export function InviteForm({
  action,
}: {
  action: (input: Input) => Promise<ActionResult<{ personId: string }>>;
}) {
  const router = useRouter();
  const state = useActionForm({
    schema,
    action,
    defaultValues: { email: '', printedName: '', isAdministrator: false },
    clearWhenSaved: true,
    onSaved: () => router.refresh(),
  });
  return (
    <div className="max-w-md">
      <ActionForm
        state={state}
        label="Invite a person"
        saved="Invited. A link that works once is on its way; give them a role on the trial’s page."
      >
        <TextField
          name="printedName"
          label="Printed name"
          help="As it will stand beside their signatures. They may correct it when they accept."
          autoComplete="off"
        />
        <TextField
          name="email"
          type="email"
          label="E-mail address"
          help="Theirs alone: accounts are never shared."
          autoComplete="off"
          autoCapitalize="none"
        />
        <Checkbox
          name="isAdministrator"
          label="Administrator of the installation"
          help="Manages people, sites and trials; sees no clinical data, signs nothing, and can hold no role in a trial."
        />
        <div className="max-md:grid">
          <SubmitButton pendingLabel="Inviting…">Send invitation</SubmitButton>
        </div>
      </ActionForm>
    </div>
  );
}
