'use client';

import type { ReactNode } from 'react';
import { get, useFormContext, useFormState } from 'react-hook-form';

/** What every field takes. */
export interface FieldProps {
  /** The path of the value in the schema's input, such as `doses.levels.2`. */
  name: string;
  label: string;
  /** A sentence below the field: what to enter, in which unit, why. */
  help?: ReactNode;
  /** Says "(optional)" behind the label. Fields are required unless they say so. */
  optional?: boolean;
  /** Hides the label from sight, not from screen readers: for fields in the cells of a table. */
  labelHidden?: boolean;
  disabled?: boolean;
}

/** The sentence that refuses a field's value, if any. */
export function useFieldError(name: string): string | undefined {
  const { control } = useFormContext();
  const { errors } = useFormState({ control, name });
  const error: unknown = get(errors, name);
  if (typeof error !== 'object' || error === null) return undefined;
  if ('message' in error && typeof error.message === 'string' && error.message) return error.message;
  const root: unknown = 'root' in error ? error.root : undefined;
  return typeof root === 'object' && root !== null && 'message' in root && typeof root.message === 'string'
    ? root.message
    : undefined;
}

/** The accessibility attributes that tie a control to its help and its error. */
export function describedBy(elementId: string, help: ReactNode, error: string | undefined) {
  const ids = [error ? `${elementId}-error` : '', help ? `${elementId}-help` : ''].filter(Boolean).join(' ');
  return { 'aria-describedby': ids || undefined, 'aria-invalid': error ? true : undefined };
}

/** The sentence that refuses a field, tied to it by its id. */
export function FieldError({ elementId, error }: { elementId: string; error: string | undefined }) {
  if (!error) return null;
  return (
    <p id={`${elementId}-error`} className="text-sm font-semibold text-brick">
      {error}
    </p>
  );
}

/** Label above, control, help below, and the error beside the control where there is room. */
export function FieldFrame({
  elementId,
  label,
  optional,
  help,
  error,
  labelHidden,
  children,
}: {
  elementId: string;
  label: string;
  optional?: boolean;
  help?: ReactNode;
  error: string | undefined;
  labelHidden?: boolean;
  children: ReactNode;
}) {
  return (
    <div className="@container">
      <div className="grid gap-x-4 gap-y-1 @xl:grid-cols-[minmax(0,26rem)_minmax(0,1fr)]">
        <label htmlFor={elementId} className={labelHidden ? 'sr-only' : 'font-semibold @xl:col-span-2'}>
          {label}
          {optional ? <span className="font-normal text-ink-soft"> (optional)</span> : null}
        </label>
        <div>{children}</div>
        <div className="@xl:self-center">
          <FieldError elementId={elementId} error={error} />
        </div>
        {help ? (
          <p id={`${elementId}-help`} className="text-sm text-ink-soft @xl:col-span-2 @xl:max-w-104">
            {help}
          </p>
        ) : null}
      </div>
    </div>
  );
}
