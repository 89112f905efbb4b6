'use client';

import type { ReactNode } from 'react';
import { useFormContext } from 'react-hook-form';
import { controlClass } from './control-class';
import { describedBy, FieldError, FieldFrame, useFieldError, type FieldProps } from './field-frame';
import { useFieldFacts } from './form-context';

/** One of the values a person may choose. */
export interface Choice {
  value: string;
  label: ReactNode;
  /** A line below the label: what follows from choosing it. */
  help?: ReactNode;
  /** Why it cannot be chosen now; it stays in view. */
  disabledReason?: string;
}

/**
 * A choice from a list that is too long to be shown whole.
 * @param prompt the first, empty line ("Choose a site"); left out when a value is always chosen
 */
export function SelectField(
  props: FieldProps & {
    choices: { value: string; label: string; disabled?: boolean }[];
    prompt?: string;
    emptyAs?: undefined | null;
  },
) {
  const { name, label, help, optional, labelHidden, disabled, choices, prompt, emptyAs } = props;
  const elementId = useFieldFacts(name, { label, ...('emptyAs' in props ? { emptyAs } : {}) });
  const { register } = useFormContext();
  const error = useFieldError(name);
  return (
    <FieldFrame {...{ elementId, label, optional, help, error, labelHidden }}>
      <select
        {...register(name)}
        id={elementId}
        disabled={disabled}
        required={!optional}
        className={controlClass(error)}
        {...describedBy(elementId, help, error)}
      >
        {prompt !== undefined ? <option value="">{prompt}</option> : null}
        {choices.map((choice) => (
          <option key={choice.value} value={choice.value} disabled={choice.disabled}>
            {choice.label}
          </option>
        ))}
      </select>
    </FieldFrame>
  );
}

/** The frame around choices that answer one question. */
export function ChoiceGroup({
  elementId,
  label,
  labelHidden,
  optional,
  help,
  error,
  children,
}: {
  elementId: string;
  error: string | undefined;
  children: ReactNode;
} & Pick<FieldProps, 'label' | 'labelHidden' | 'optional' | 'help'>) {
  return (
    <fieldset id={elementId} {...describedBy(elementId, help, error)} aria-invalid={undefined}>
      <legend className={labelHidden ? 'sr-only' : 'font-semibold'}>
        {label}
        {optional ? <span className="font-normal text-ink-soft"> (optional)</span> : null}
      </legend>
      {help ? (
        <p id={`${elementId}-help`} className="text-sm text-ink-soft">
          {help}
        </p>
      ) : null}
      <FieldError elementId={elementId} error={error} />
      {children}
    </fieldset>
  );
}

const radioClass =
  'mt-0.75 size-4.5 flex-none cursor-pointer appearance-none rounded-full border-2 border-ink-soft bg-paper checked:border-[5.5px] checked:border-water disabled:cursor-not-allowed disabled:border-line print:appearance-auto';

/** One choice: its control, its label, and the line below it. */
export function ChoiceLine({
  choice,
  control,
  plain,
}: {
  choice: Choice;
  control: ReactNode;
  plain: boolean;
}) {
  return (
    <label
      className={`flex gap-2.5 border-line ${plain ? 'py-1' : 'border-b py-2.25 last:border-b-0'} ${
        choice.disabledReason ? 'text-ink-soft' : ''
      }`}
    >
      {control}
      <span>
        {choice.label}
        {choice.help ? <small className="block text-xs text-ink-soft">{choice.help}</small> : null}
        {choice.disabledReason ? (
          <small className="block text-xs text-ink-soft">{choice.disabledReason}</small>
        ) : null}
      </span>
    </label>
  );
}

/**
 * One of a few choices, each with a line that says what follows from it.
 * @param inline sets short choices without help side by side
 */
export function RadioGroup(props: FieldProps & { choices: Choice[]; inline?: boolean }) {
  const { name, label, help, optional, labelHidden, disabled, choices, inline = false } = props;
  const elementId = useFieldFacts(name, { label });
  const { register } = useFormContext();
  const error = useFieldError(name);
  return (
    <ChoiceGroup {...{ elementId, label, labelHidden, optional, help, error }}>
      <div className={inline ? 'flex flex-wrap gap-x-6' : ''}>
        {choices.map((choice) => (
          <ChoiceLine
            key={choice.value}
            choice={choice}
            plain={inline}
            control={
              <input
                {...register(name)}
                type="radio"
                value={choice.value}
                disabled={disabled || Boolean(choice.disabledReason)}
                className={radioClass}
              />
            }
          />
        ))}
      </div>
    </ChoiceGroup>
  );
}
