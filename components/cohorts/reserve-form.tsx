'use client';

import { useRouter } from 'next/navigation';
import { useWatch } from 'react-hook-form';
import { ActionForm } from '@/components/forms/action-form';
import { SelectField } from '@/components/forms/choice-fields';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextField } from '@/components/forms/text-field';
import { useActionForm } from '@/components/forms/use-action-form';
import type { TrialAction } from './cohort-data';
import { useSay } from './saved-notice';

const schema = trialSchema('reserve-slot');

/** Reserves the lowest free place of the open cohort for a subject of one of the reader's sites. */
export function ReserveForm({
  trialCode,
  cohortId,
  sites,
  spot,
  action,
  isPrimary,
  why,
}: {
  trialCode: string;
  cohortId: string;
  sites: readonly { readonly id: string; readonly name: string; readonly code: string }[];
  spot: string;
  action: TrialAction<'reserve-slot'>;
  isPrimary: boolean;
  /** Why no place may be reserved now. */
  why: string | null;
}) {
  const router = useRouter();
  const say = useSay();
  const state = useActionForm({
    schema,
    action,
    defaultValues: { trialCode, cohortId, siteId: sites.length === 1 ? (sites[0]?.id ?? '') : '', code: '' },
    clearWhenSaved: true,
    onSaved: () => {
      say(spot, 'Recorded. The place is reserved; record the dosing when it has happened.');
      router.refresh();
    },
  });
  const siteId = useWatch({ control: state.form.control, name: 'siteId' });
  const site = sites.find((each) => each.id === siteId) ?? sites[0];
  return (
    <ActionForm state={state} label="Reserve a place">
      {sites.length > 1 ? (
        <SelectField
          name="siteId"
          label="Site"
          prompt="Choose a site"
          choices={sites.map(({ id, name }) => ({ value: id, label: name }))}
        />
      ) : null}
      <TextField
        name="code"
        label="Subject code"
        mono
        autoComplete="off"
        autoCapitalize="characters"
        spellCheck={false}
        maxLength={40}
        help={`The site’s code, a hyphen and a number, such as ${site?.code ?? 'SITE'}-014. No name, initials, birth date or record number.`}
      />
      <div>
        <SubmitButton
          variant={isPrimary ? 'primary' : 'secondary'}
          pendingLabel="Reserving…"
          disabledReason={why ?? undefined}
        >
          Reserve a place
        </SubmitButton>
      </div>
    </ActionForm>
  );
}
