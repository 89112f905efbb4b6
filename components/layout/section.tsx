import { useId, type ReactNode } from 'react';

/**
 * A part of the work under its own heading and hairline.
 * @param raised sets it on stone with a border, for the one act of a page ("Your decision")
 * @param aside what stands at the right end of the heading: a link, a count, a small button
 */
export function Section({
  title,
  children,
  raised = false,
  aside,
  id,
}: {
  title: ReactNode;
  children: ReactNode;
  raised?: boolean;
  aside?: ReactNode;
  id?: string;
}) {
  const headingId = useId();
  const frame = raised
    ? 'border border-line bg-stone px-4 py-4 md:px-5.5 md:py-5 print:border-ink-soft'
    : 'border-t border-line pt-4.5 pb-5.5';
  return (
    <section id={id} aria-labelledby={headingId} className={frame}>
      <div className="mb-2.5 flex flex-wrap items-baseline justify-between gap-x-4 gap-y-1">
        <h2 id={headingId} className="text-lg">
          {title}
        </h2>
        {aside}
      </div>
      {children}
    </section>
  );
}

/** Two parts side by side where there is room (the first a little wider), one below the other on a phone. */
export function TwoColumns({ children }: { children: ReactNode }) {
  return <div className="grid gap-x-9 gap-y-5 md:grid-cols-[minmax(0,1.15fr)_minmax(0,1fr)]">{children}</div>;
}
