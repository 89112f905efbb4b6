'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { SelectField } from '@/components/forms/choice-fields';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { useActionForm } from '@/components/forms/use-action-form';
import type { ActionResult } from '@/lib/schemas/action-result';
import type { TrialFormInput } from '@/lib/schemas/trial-forms';

const schema = trialSchema('add-site');

/** Takes a site into the trial. */
export function AddSiteForm({
  trialCode,
  sites,
  action,
}: {
  trialCode: string;
  sites: { value: string; label: string }[];
  action: (input: TrialFormInput<'add-site'>) => Promise<ActionResult<unknown>>;
}) {
  const router = useRouter();
  const state = useActionForm({
    schema,
    action,
    defaultValues: { trialCode, siteId: '' },
    clearWhenSaved: true,
    onSaved: () => router.refresh(),
  });
  return (
    <div className="max-w-md">
      <ActionForm state={state} label="Add a site" saved="Added. People can now be given roles for it.">
        <SelectField name="siteId" label="Add a site" prompt="Choose a site" choices={sites} />
        <div className="max-md:grid">
          <SubmitButton variant="secondary" pendingLabel="Adding…">
            Add site
          </SubmitButton>
        </div>
      </ActionForm>
    </div>
  );
}
