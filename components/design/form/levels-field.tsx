'use client';

import { useId, useState } from 'react';
import { useFormContext, useWatch } from 'react-hook-form';
import { GroupError } from '@/components/forms/group-error';
import { controlClass } from '@/components/forms/control-class';
import { describedBy, FieldError, FieldFrame, useFieldError } from '@/components/forms/field-frame';
import { useFieldFacts } from '@/components/forms/form-context';
import { Button } from '@/components/ui/button';
import { DESIGN_LIMITS } from '@/lib/schemas/design-limits';
import { LEVELS_TEXT_LENGTH, readLevels } from './levels-text';

const NAME = 'design.doses.levels';

/** The dose levels, lowest first: added and removed one by one, or pasted as a list. */
export function LevelsField({ unit }: { unit: string }) {
  const { control, setValue, setFocus } = useFormContext();
  const levels = useWatch({ control, name: NAME }) as unknown[];
  const { minimum, maximum } = DESIGN_LIMITS.levels;
  const set = (next: readonly unknown[]) => setValue(NAME, next, { shouldDirty: true });
  const add = () => {
    set([...levels, '']);
    setTimeout(() => setFocus(`${NAME}.${levels.length}`));
  };
  return (
    <fieldset className="grid gap-2">
      <legend className="mb-1 font-semibold">Dose levels, {unit}</legend>
      <GroupError name={NAME} label="Dose levels" />
      <ol className="grid gap-1.5">
        {levels.map((_, index) => (
          <LevelRow
            key={index}
            name={`${NAME}.${index}`}
            number={index + 1}
            onRemove={
              levels.length > minimum
                ? () => set(levels.filter((_each, other) => other !== index))
                : undefined
            }
          />
        ))}
      </ol>
      <div className="flex flex-wrap items-start gap-x-4 gap-y-2 pl-8">
        <Button
          small
          onClick={add}
          disabledReason={levels.length >= maximum ? `A trial has at most ${maximum} levels.` : undefined}
        >
          Add a level
        </Button>
        <PasteLevels onRead={set} />
      </div>
    </fieldset>
  );
}

/** One level: its number, its dose, its removal, and beside them why it is refused. */
function LevelRow({ name, number, onRemove }: { name: string; number: number; onRemove?: () => void }) {
  const label = `Level ${number}`;
  const elementId = useFieldFacts(name, { label });
  const { register } = useFormContext();
  const error = useFieldError(name);
  return (
    <li className="flex flex-wrap items-center gap-x-3 gap-y-1">
      <label htmlFor={elementId} className="w-5 text-right text-ink-soft">
        {number}
      </label>
      <span className="w-40">
        <input
          {...register(name)}
          id={elementId}
          aria-label={label}
          type="text"
          inputMode="decimal"
          autoComplete="off"
          required
          className={`${controlClass(error)} text-right`}
          {...describedBy(elementId, null, error)}
        />
      </span>
      <Button
        small
        variant="quiet"
        aria-label={`Remove level ${number}`}
        disabled={onRemove === undefined}
        onClick={onRemove}
      >
        Remove
      </Button>
      <div className="min-w-40 flex-1 empty:hidden max-md:w-full max-md:flex-none">
        <FieldError elementId={elementId} error={error} />
      </div>
    </li>
  );
}

function PasteLevels({ onRead }: { onRead: (levels: readonly string[]) => void }) {
  const [isOpen, setOpen] = useState(false);
  const [text, setText] = useState('');
  const [error, setError] = useState<string>();
  const id = useId();
  if (!isOpen) {
    return (
      <Button small variant="quiet" onClick={() => setOpen(true)}>
        Paste a list
      </Button>
    );
  }
  const replace = () => {
    const reading = readLevels(text);
    setError(reading.ok ? undefined : reading.sentence);
    if (!reading.ok) return;
    onRead(reading.levels);
    setText('');
    setOpen(false);
  };
  const help = 'Separated by commas, blanks or lines, such as 10, 20, 40. It replaces the levels above.';
  return (
    <div className="grid w-full gap-2">
      <FieldFrame elementId={id} label="List of levels" help={help} error={error}>
        <textarea
          id={id}
          rows={2}
          autoFocus
          maxLength={LEVELS_TEXT_LENGTH * 10}
          value={text}
          onChange={(event) => setText(event.target.value)}
          className={`${controlClass(error)} block`}
          {...describedBy(id, help, error)}
        />
      </FieldFrame>
      <div className="flex flex-wrap gap-2">
        <Button small onClick={replace}>
          Use this list
        </Button>
        <Button small variant="quiet" onClick={() => setOpen(false)}>
          Keep the levels
        </Button>
      </div>
    </div>
  );
}
