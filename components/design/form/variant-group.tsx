'use client';

import { useId, type ReactNode } from 'react';
import { describedBy, FieldError, useFieldError } from '@/components/forms/field-frame';
import { useFieldFacts } from '@/components/forms/form-context';

/** A variant a person may choose. */
export interface Variant {
  readonly value: string;
  readonly label: ReactNode;
  readonly help?: ReactNode;
}

/**
 * A choice of one group of settings among several; what the chosen one asks for stands below it.
 * @param name the path of the group, where what refuses the whole of it is shown
 */
export function VariantGroup({
  name,
  label,
  labelHidden = false,
  help,
  variants,
  chosen,
  onChoose,
  inline = false,
}: {
  name: string;
  label: string;
  labelHidden?: boolean;
  help?: ReactNode;
  variants: readonly Variant[];
  chosen: string;
  onChoose: (value: string) => void;
  inline?: boolean;
}) {
  const elementId = useFieldFacts(name, { label });
  const group = useId();
  const error = useFieldError(name);
  return (
    <fieldset id={elementId} {...describedBy(elementId, help, error)} aria-invalid={undefined}>
      <legend className={labelHidden ? 'sr-only' : 'font-semibold'}>{label}</legend>
      {help ? (
        <p id={`${elementId}-help`} className="text-sm text-ink-soft">
          {help}
        </p>
      ) : null}
      <FieldError elementId={elementId} error={error} />
      <div className={inline ? 'flex flex-wrap gap-x-6' : ''}>
        {variants.map((variant) => (
          <label
            key={variant.value}
            className={`flex gap-2.5 border-line ${inline ? 'py-1' : 'border-b py-2.25 last:border-b-0'}`}
          >
            <input
              type="radio"
              name={group}
              value={variant.value}
              checked={variant.value === chosen}
              onChange={() => onChoose(variant.value)}
              className="mt-0.75 size-4.5 flex-none cursor-pointer appearance-none rounded-full border-2 border-ink-soft bg-paper checked:border-[5.5px] checked:border-water print:appearance-auto"
            />
            <span>
              {variant.label}
              {variant.help ? <small className="block text-xs text-ink-soft">{variant.help}</small> : null}
            </span>
          </label>
        ))}
      </div>
    </fieldset>
  );
}
