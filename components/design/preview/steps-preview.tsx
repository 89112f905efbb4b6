'use client';

import { useId, useState } from 'react';
import { controlClass } from '@/components/forms/control-class';
import { equalDecimals } from '@/lib/design/decimal';
import { doseText } from '@/lib/design/dose-text';
import type { Design } from '@/lib/schemas/design';
import { FIRST_STEPS, dosesToStepFrom } from './first-steps';
import { FirstStepsTable, StepsNote } from './first-steps-table';

/** The first steps in dose units from a dose the reader chooses; the starting dose at first. */
export function StepsPreview({ design }: { design: Design }) {
  const [chosen, setChosen] = useState<string | null>(null);
  const id = useId();
  const doses = dosesToStepFrom(design);
  const around =
    doses.find((dose) => chosen !== null && equalDecimals(dose, chosen)) ??
    doses.find((dose) => equalDecimals(dose, design.startingDose)) ??
    design.startingDose;
  return (
    <div className="grid gap-2.5">
      <label htmlFor={id} className="flex flex-wrap items-center gap-x-2.5 gap-y-1 font-semibold">
        The first {FIRST_STEPS} steps from
        <span>
          <select
            id={id}
            value={around}
            onChange={(event) => setChosen(event.target.value)}
            className={`${controlClass(undefined, true)} font-normal`}
          >
            {doses.map((dose) => (
              <option key={dose} value={dose}>
                {doseText(design, dose)}
              </option>
            ))}
          </select>
        </span>
      </label>
      <FirstStepsTable design={design} around={around} />
      <StepsNote design={design} />
    </div>
  );
}
