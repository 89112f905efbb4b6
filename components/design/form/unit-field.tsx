'use client';

import { useId, useState } from 'react';
import { useFormContext, useWatch } from 'react-hook-form';
import { controlClass } from '@/components/forms/control-class';
import { FieldFrame } from '@/components/forms/field-frame';
import { TextField } from '@/components/forms/text-field';

const NAME = 'design.unit';
const OTHER = 'other';

/** A unit offered first: its code, the text people read, its name. */
export interface OfferedUnit {
  readonly code: string;
  readonly text: string;
  readonly name: string;
}

/** The unit of doses: one of those offered, or any other by its UCUM code. */
export function UnitField({ units }: { units: readonly OfferedUnit[] }) {
  const { control, setValue, getValues } = useFormContext();
  const code = useWatch({ control, name: NAME }) as string;
  const id = useId();
  const [isOther, setOther] = useState(() => !units.some((unit) => unit.code === getValues(NAME)));
  const [typed, setTyped] = useState('');
  const choose = (value: string) => {
    if (isOther) setTyped(code);
    setOther(value === OTHER);
    setValue(NAME, value === OTHER ? typed : value, { shouldDirty: true });
  };
  return (
    <div className="grid gap-3">
      <FieldFrame elementId={id} label="Unit" error={undefined}>
        <select
          id={id}
          value={isOther ? OTHER : code}
          onChange={(event) => choose(event.target.value)}
          className={controlClass()}
        >
          {units.map((unit) => (
            <option key={unit.code} value={unit.code}>
              {unit.text} – {unit.name}
            </option>
          ))}
          <option value={OTHER}>Another unit, by its UCUM code</option>
        </select>
      </FieldFrame>
      {isOther ? (
        <TextField
          name={NAME}
          label="UCUM code"
          help="The code of the Unified Code for Units of Measure; capital and small letters count, such as ug/kg or [iU]."
          mono
          autoCapitalize="none"
          spellCheck={false}
        />
      ) : null}
    </div>
  );
}
