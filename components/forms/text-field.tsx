'use client';

import type { ComponentProps } from 'react';
import { useFormContext } from 'react-hook-form';
import { controlClass } from './control-class';
import { describedBy, FieldFrame, useFieldError, type FieldProps } from './field-frame';
import { useFieldFacts } from './form-context';

type Inherited = Pick<
  ComponentProps<'input'>,
  'autoComplete' | 'inputMode' | 'placeholder' | 'spellCheck' | 'maxLength' | 'autoCapitalize'
>;

interface TextFieldProps extends FieldProps, Inherited {
  type?: 'text' | 'email' | 'tel' | 'url' | 'search' | 'date';
  /** What an empty field is sent as: `undefined` for an optional text, `null` for a nullable one; default ''. */
  emptyAs?: undefined | null;
  /** Codes and digests are set in the monospaced face. */
  mono?: boolean;
}

/** A line of text, an e-mail address, or a calendar day (`type="date"`, value `YYYY-MM-DD`). */
export function TextField(props: TextFieldProps) {
  const {
    name,
    label,
    help,
    optional,
    labelHidden,
    disabled,
    type = 'text',
    mono,
    emptyAs,
    ...input
  } = props;
  const elementId = useFieldFacts(name, { label, ...('emptyAs' in props ? { emptyAs } : {}) });
  const { register } = useFormContext();
  const error = useFieldError(name);
  return (
    <FieldFrame {...{ elementId, label, optional, help, error, labelHidden }}>
      <input
        {...input}
        {...register(name)}
        id={elementId}
        type={type}
        disabled={disabled}
        required={!optional}
        className={`${controlClass(error)} ${mono ? 'font-mono' : ''} ${type === 'date' ? 'max-w-48' : ''}`}
        {...describedBy(elementId, help, error)}
      />
    </FieldFrame>
  );
}

/** Text over several lines: a reason, a note. */
export function TextArea({
  rows = 3,
  ...props
}: FieldProps & { rows?: number; placeholder?: string; emptyAs?: undefined | null }) {
  const { name, label, help, optional, labelHidden, disabled, placeholder, emptyAs } = props;
  const elementId = useFieldFacts(name, { label, ...('emptyAs' in props ? { emptyAs } : {}) });
  const { register } = useFormContext();
  const error = useFieldError(name);
  return (
    <FieldFrame {...{ elementId, label, optional, help, error, labelHidden }}>
      <textarea
        {...register(name)}
        id={elementId}
        rows={rows}
        placeholder={placeholder}
        disabled={disabled}
        required={!optional}
        className={`${controlClass(error)} block`}
        {...describedBy(elementId, help, error)}
      />
    </FieldFrame>
  );
}
