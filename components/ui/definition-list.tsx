import type { ReactNode } from 'react';

/** Terms and what holds for them; a term beside its text where there is room. */
export function DefinitionList({ items }: { items: { term: ReactNode; detail: ReactNode; key?: string }[] }) {
  return (
    <dl className="@container">
      {items.map(({ term, detail, key }, index) => (
        <div
          key={key ?? index}
          className="grid gap-x-4 border-b border-line py-1.75 @sm:grid-cols-[minmax(0,12rem)_minmax(0,1fr)]"
        >
          <dt className="text-ink-soft">{term}</dt>
          <dd>{detail}</dd>
        </div>
      ))}
    </dl>
  );
}
