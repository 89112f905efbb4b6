'use client';

import type { ReactNode } from 'react';
import { FormProvider, type FieldValues } from 'react-hook-form';
import { Notice } from '../ui/notice';
import { ErrorSummary } from './error-summary';
import { ActionFormContext } from './form-context';
import type { ActionFormState } from './use-action-form';

/**
 * The element of a form made with `useActionForm`: the summary of what is wrong, the fields, and "saved".
 * @param label the accessible name, where no heading names the form
 * @param saved what is said after success; left out, nothing is (the page changes instead)
 */
export function ActionForm<Values extends FieldValues, Value>({
  state,
  children,
  label,
  labelledBy,
  saved,
  className = 'grid gap-4.5',
}: {
  state: ActionFormState<Values, Value>;
  children: ReactNode;
  label?: string;
  labelledBy?: string;
  saved?: ReactNode | ((value: Value) => ReactNode);
  className?: string;
}) {
  const { form, parts, outcome, submit, prepare } = state;
  return (
    <FormProvider {...form}>
      <ActionFormContext value={parts}>
        <form
          method="post"
          noValidate
          aria-label={label}
          aria-labelledby={labelledBy}
          onSubmit={submit}
          onFocus={prepare}
          className="@container"
        >
          <ErrorSummary outcome={outcome} />
          <div className={className}>{children}</div>
          {outcome.kind === 'saved' && saved ? (
            <div className="mt-4">
              <Notice kind="saved">{typeof saved === 'function' ? saved(outcome.value) : saved}</Notice>
            </div>
          ) : null}
        </form>
      </ActionFormContext>
    </FormProvider>
  );
}
