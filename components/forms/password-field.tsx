'use client';

import { useState } from 'react';
import { useFormContext } from 'react-hook-form';
import { controlClass } from './control-class';
import { describedBy, FieldFrame, useFieldError, type FieldProps } from './field-frame';
import { useFieldFacts } from './form-context';

/**
 * A password: pasting is allowed, it can be shown, and it is emptied after every answer of the server.
 * @param autoComplete `current-password`, `new-password`, `one-time-code`, or `off` where signing must not be prefilled
 */
export function PasswordField(
  props: FieldProps & { autoComplete: 'current-password' | 'new-password' | 'one-time-code' | 'off' },
) {
  const { name, label, help, optional, labelHidden, disabled, autoComplete } = props;
  const elementId = useFieldFacts(name, { label, secret: true });
  const { register } = useFormContext();
  const error = useFieldError(name);
  const [shown, setShown] = useState(false);
  return (
    <FieldFrame {...{ elementId, label, optional, help, error, labelHidden }}>
      <span className="relative block">
        <input
          {...register(name)}
          id={elementId}
          type={shown ? 'text' : 'password'}
          autoComplete={autoComplete}
          autoCapitalize="none"
          spellCheck={false}
          disabled={disabled}
          required={!optional}
          className={`${controlClass(error)} pr-18`}
          {...describedBy(elementId, help, error)}
        />
        <button
          type="button"
          aria-label={`${shown ? 'Hide' : 'Show'} ${label.toLowerCase()}`}
          aria-controls={elementId}
          onClick={() => setShown(!shown)}
          className="absolute inset-y-0 right-0 min-w-11 px-3 text-sm text-water underline underline-offset-3"
        >
          {shown ? 'Hide' : 'Show'}
        </button>
      </span>
    </FieldFrame>
  );
}
