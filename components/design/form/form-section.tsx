import { useId, type ReactNode } from 'react';

/** A part of the form under its heading. */
export function FormSection({
  title,
  lede,
  children,
}: {
  title: string;
  lede?: ReactNode;
  children: ReactNode;
}) {
  const id = useId();
  return (
    <section aria-labelledby={id} className="grid gap-4.5 border-t border-line pt-4.5 pb-2">
      <div>
        <h2 id={id} className="text-lg">
          {title}
        </h2>
        {lede ? <p className="mt-1 max-w-prose text-sm text-ink-soft">{lede}</p> : null}
      </div>
      {children}
    </section>
  );
}

/** The settings of a variant, set in from the choice above them. */
export function Indented({ children }: { children: ReactNode }) {
  return <div className="ml-2 grid gap-4 border-l-2 border-line pl-4">{children}</div>;
}
