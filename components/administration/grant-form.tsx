'use client';

import { useRouter } from 'next/navigation';
import { useWatch } from 'react-hook-form';
import { ActionForm } from '@/components/forms/action-form';
import { CheckboxGroup } from '@/components/forms/checkbox-fields';
import { RadioGroup, SelectField } from '@/components/forms/choice-fields';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { useActionForm } from '@/components/forms/use-action-form';
import { ROLE_NAMES, SITE_ROLES, TRIAL_ROLES, type TrialRole } from '@/lib/policy/roles';
import type { ActionResult } from '@/lib/schemas/action-result';
import type { TrialFormInput } from '@/lib/schemas/trial-forms';

const schema = trialSchema('grant-membership');

/** What each role is for, in the line below its name. */
const ROLE_HELP: Readonly<Record<TrialRole, string>> = {
  coordinator: 'Reserves slots and records dosing and outcomes, for the sites chosen.',
  investigator: 'All acts of a coordinator, for the sites chosen.',
  reviewer:
    'Judges and signs each step. Never somebody who recorded data or proposed a design of this trial.',
  statistician: 'Writes and amends the design.',
  sponsor: 'Sees signed doses and counts, never a subject’s row.',
  monitor: 'Reads records, trail and signatures.',
};

/** Grants one role in the trial. A refusal is shown beside the field it concerns; nothing chosen is lost. */
export function GrantForm({
  trialCode,
  people,
  sites,
  action,
}: {
  trialCode: string;
  people: { value: string; label: string }[];
  sites: { value: string; label: string }[];
  action: (input: TrialFormInput<'grant-membership'>) => Promise<ActionResult<unknown>>;
}) {
  const router = useRouter();
  const state = useActionForm({
    schema,
    action: (input) => action({ ...input, siteIds: SITE_ROLES.includes(input.role) ? input.siteIds : [] }),
    defaultValues: { trialCode, personId: '', role: undefined, siteIds: [] },
    clearWhenSaved: true,
    onSaved: () => router.refresh(),
  });
  const role = useWatch({ control: state.form.control, name: 'role' });
  return (
    <div className="max-w-xl">
      <ActionForm state={state} label="Grant a role" saved="Granted. It holds from now on.">
        <SelectField
          name="personId"
          label="Person"
          prompt="Choose a person"
          choices={people}
          help="One role a person and trial; a coordinator may have several sites."
        />
        <RadioGroup
          name="role"
          label="Role"
          choices={TRIAL_ROLES.map((each) => ({
            value: each,
            label: ROLE_NAMES[each],
            help: ROLE_HELP[each],
          }))}
        />
        {role !== undefined && SITE_ROLES.includes(role) ? (
          sites.length === 0 ? (
            <p className="text-ink-soft">The trial has no site yet. Add one first; this role is for sites.</p>
          ) : (
            <CheckboxGroup name="siteIds" label="Sites" help="At least one." choices={sites} />
          )
        ) : null}
        <div className="max-md:grid">
          <SubmitButton pendingLabel="Granting…">Grant role</SubmitButton>
        </div>
      </ActionForm>
    </div>
  );
}
