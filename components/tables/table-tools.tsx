'use client';

import { useId, useState } from 'react';
import { controlClass } from '../forms/control-class';
import { buttonClass } from '../ui/button';
import type { Column } from './columns';

/** Search over every column at once. */
export function Search({
  what,
  value,
  onChange,
}: {
  what: string;
  value: string;
  onChange: (text: string) => void;
}) {
  const id = useId();
  return (
    <div className="grid gap-0.5">
      <label htmlFor={id} className="text-xs font-semibold text-ink-soft">
        Search {what}
      </label>
      <input
        id={id}
        type="search"
        value={value}
        onChange={(event) => onChange(event.target.value)}
        className={`${controlClass(undefined, true)} max-w-64`}
      />
    </div>
  );
}

/** The order of the rows, where the headers are out of sight. */
export function PhoneSort({
  columns,
  value,
  onChange,
}: {
  columns: readonly Column[];
  value: { id: string; desc: boolean } | undefined;
  onChange: (sort: { id: string; desc: boolean } | null) => void;
}) {
  const id = useId();
  return (
    <div className="grid gap-0.5 md:hidden">
      <label htmlFor={id} className="text-xs font-semibold text-ink-soft">
        Order by
      </label>
      <select
        id={id}
        value={value ? `${value.desc ? '-' : '+'}${value.id}` : ''}
        onChange={({ target }) =>
          onChange(target.value ? { id: target.value.slice(1), desc: target.value.startsWith('-') } : null)
        }
        className={controlClass(undefined, true)}
      >
        <option value="">As listed</option>
        {columns
          .filter(({ acts }) => !acts)
          .flatMap((column) => [
            <option key={`+${column.key}`} value={`+${column.key}`}>
              {column.header}, rising
            </option>,
            <option key={`-${column.key}`} value={`-${column.key}`}>
              {column.header}, falling
            </option>,
          ])}
      </select>
    </div>
  );
}

/** Which columns are shown. */
export function ColumnChoice({
  items,
}: {
  items: { id: string; label: string; shown: boolean; toggle: () => void }[];
}) {
  const [open, setOpen] = useState(false);
  const id = useId();
  if (items.length < 2) return null;
  return (
    <div
      className="relative"
      onKeyDown={(event) => {
        if (event.key === 'Escape') setOpen(false);
      }}
    >
      <button
        type="button"
        aria-expanded={open}
        aria-controls={id}
        onClick={() => setOpen(!open)}
        className={buttonClass('secondary', true)}
      >
        Columns
      </button>
      <fieldset
        id={id}
        hidden={!open}
        className="absolute right-0 z-20 mt-1 w-56 border border-line bg-paper px-3.5 py-2.5"
      >
        <legend className="sr-only">Columns shown</legend>
        {items.map((item) => (
          <label key={item.id} className="flex gap-2.5 py-1">
            <input
              type="checkbox"
              checked={item.shown}
              onChange={item.toggle}
              className="size-4.5 accent-water"
            />
            {item.label}
          </label>
        ))}
      </fieldset>
    </div>
  );
}
