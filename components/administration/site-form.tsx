'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { SelectField } from '@/components/forms/choice-fields';
import { installationSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextField } from '@/components/forms/text-field';
import { useActionForm } from '@/components/forms/use-action-form';
import type { ActionResult, Submission } from '@/lib/schemas/action-result';

const schema = installationSchema('create-site');

type Input = { code: string; name: string; timeZone: string } & Submission;

/** Creates a site: its code, name and time zone. */
export function SiteForm({
  timeZones,
  action,
}: {
  timeZones: readonly string[];
  action: (input: Input) => Promise<ActionResult<{ siteId: string }>>;
}) {
  const router = useRouter();
  const state = useActionForm({
    schema,
    action,
    defaultValues: { code: '', name: '', timeZone: '' },
    clearWhenSaved: true,
    onSaved: () => router.refresh(),
  });
  return (
    <div className="max-w-md">
      <ActionForm state={state} label="Create a site" saved="Created. Add it to a trial on the trial’s page.">
        <TextField
          name="code"
          label="Code"
          mono
          autoCapitalize="characters"
          autoComplete="off"
          help="2 to 12 capital letters and digits. Subject codes begin with it, as in ALD-014."
        />
        <TextField name="name" label="Name" autoComplete="off" help="As letters and mails name the site." />
        <SelectField
          name="timeZone"
          label="Time zone"
          prompt="Choose a time zone"
          choices={timeZones.map((zone) => ({ value: zone, label: zone.replaceAll('_', ' ') }))}
          help="Times at the site are entered and shown in it."
        />
        <div className="max-md:grid">
          <SubmitButton pendingLabel="Creating…">Create site</SubmitButton>
        </div>
      </ActionForm>
    </div>
  );
}
