'use client';

import { useFormContext } from 'react-hook-form';
import { type Choice, ChoiceGroup, ChoiceLine } from './choice-fields';
import { describedBy, FieldError, useFieldError, type FieldProps } from './field-frame';
import { useFieldFacts } from './form-context';

const checkboxClass = 'mt-0.75 size-4.5 flex-none cursor-pointer accent-water disabled:cursor-not-allowed';

/** Any number of choices; the value is the array of those ticked. */
export function CheckboxGroup(props: FieldProps & { choices: Choice[] }) {
  const { name, label, help, optional, labelHidden, disabled, choices } = props;
  const elementId = useFieldFacts(name, { label });
  const { register } = useFormContext();
  const error = useFieldError(name);
  return (
    <ChoiceGroup {...{ elementId, label, labelHidden, optional, help, error }}>
      {choices.map((choice) => (
        <ChoiceLine
          key={choice.value}
          choice={choice}
          plain
          control={
            <input
              {...register(name)}
              type="checkbox"
              value={choice.value}
              disabled={disabled || Boolean(choice.disabledReason)}
              className={checkboxClass}
            />
          }
        />
      ))}
    </ChoiceGroup>
  );
}

/** A statement that is true or not; the value is a boolean. */
export function Checkbox({ name, label, help, disabled }: Omit<FieldProps, 'optional' | 'labelHidden'>) {
  const elementId = useFieldFacts(name, { label });
  const { register } = useFormContext();
  const error = useFieldError(name);
  return (
    <div className="grid gap-1">
      <label className="flex gap-2.5">
        <input
          {...register(name)}
          id={elementId}
          type="checkbox"
          disabled={disabled}
          className={checkboxClass}
          {...describedBy(elementId, help, error)}
        />
        <span>{label}</span>
      </label>
      {help ? (
        <p id={`${elementId}-help`} className="pl-7 text-sm text-ink-soft">
          {help}
        </p>
      ) : null}
      <FieldError elementId={elementId} error={error} />
    </div>
  );
}
