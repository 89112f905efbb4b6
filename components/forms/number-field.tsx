'use client';

import { useState } from 'react';
import { useController, useFormContext } from 'react-hook-form';
import { controlClass } from './control-class';
import { describedBy, FieldFrame, useFieldError, type FieldProps } from './field-frame';
import { useFieldFacts } from './form-context';
import { readNumber, textOfNumber } from './number-text';

interface NumberFieldProps extends FieldProps {
  /** Shown behind the field. */
  unit?: string;
  /** What an empty field is sent as; default `undefined`. */
  emptyAs?: undefined | null;
  /** A whole number: phones show the digits only. */
  whole?: boolean;
}

function valueOf(text: string): number | string {
  if (text.trim() === '') return '';
  const reading = readNumber(text);
  return reading.ok ? reading.value : text;
}

function unreadable(text: string): string | null {
  const reading = readNumber(text);
  return reading.ok ? null : reading.sentence;
}

/**
 * A number, typed as text and read exactly: "1,5" is refused with a sentence instead of being guessed at.
 * The form's value is a number, '' while empty, or the text as typed while it cannot be read.
 */
export function NumberField(props: NumberFieldProps) {
  const { name, help, optional, labelHidden, disabled, unit, emptyAs, whole } = props;
  const label = unit ? `${props.label}, ${unit}` : props.label;
  const elementId = useFieldFacts(name, { label, unreadable, emptyAs });
  const {
    field: { ref, value, onChange, onBlur },
  } = useController({ name });
  const [typed, setTyped] = useState(() => textOfNumber(value));
  const shown = Object.is(valueOf(typed), value ?? '') ? typed : textOfNumber(value);
  const error = useFieldError(name);
  return (
    <FieldFrame {...{ elementId, label, optional, help, error, labelHidden }}>
      <input
        id={elementId}
        ref={ref}
        name={name}
        type="text"
        inputMode={whole ? 'numeric' : 'decimal'}
        autoComplete="off"
        value={shown}
        disabled={disabled}
        required={!optional}
        onChange={(event) => {
          setTyped(event.target.value);
          onChange(valueOf(event.target.value));
        }}
        onBlur={onBlur}
        className={`${controlClass(error)} max-w-40 text-right`}
        {...describedBy(elementId, help, error)}
      />
    </FieldFrame>
  );
}

/** An exact decimal, such as a dose: it stays the text that was typed, and the schema reads it. */
export function DecimalField(props: FieldProps & { unit?: string; emptyAs?: undefined | null }) {
  const { name, help, optional, labelHidden, disabled, unit, emptyAs } = props;
  const label = unit ? `${props.label}, ${unit}` : props.label;
  const elementId = useFieldFacts(name, { label, ...('emptyAs' in props ? { emptyAs } : {}) });
  const { register } = useFormContext();
  const error = useFieldError(name);
  return (
    <FieldFrame {...{ elementId, label, optional, help, error, labelHidden }}>
      <input
        {...register(name)}
        id={elementId}
        type="text"
        inputMode="decimal"
        autoComplete="off"
        disabled={disabled}
        required={!optional}
        className={`${controlClass(error)} max-w-40 text-right`}
        {...describedBy(elementId, help, error)}
      />
    </FieldFrame>
  );
}
