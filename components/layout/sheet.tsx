import type { ReactNode } from 'react';

/**
 * A page as a sheet with a margin: the margin holds what is true around the work, the sheet holds the work.
 * On a phone the caution comes first, then the work, then the rest of the margin; the order of the
 * document is that of the phone. Without caution and margin the work takes the whole width.
 * @param caution a `<Caution>`, on pages that show a calculated dose
 * @param margin one or more `<MarginNote>`
 */
export function Sheet({
  children,
  caution,
  margin,
}: {
  children: ReactNode;
  caution?: ReactNode;
  margin?: ReactNode;
}) {
  const frame = 'mx-auto max-w-sheet px-4 pt-4.5 pb-10 md:px-8 md:pt-7 md:pb-15 print:p-0';
  if (!caution && !margin) {
    return (
      <main id="work" tabIndex={-1} className={frame}>
        {children}
      </main>
    );
  }
  return (
    <main
      id="work"
      tabIndex={-1}
      className={`${frame} grid grid-cols-[minmax(0,1fr)] md:grid-cols-[264px_minmax(0,1fr)] md:grid-rows-[auto_1fr] print:block`}
    >
      {caution ? <div className="mb-4 md:col-start-1 md:mb-0 md:pr-6">{caution}</div> : null}
      <div className="min-w-0 md:col-start-2 md:row-span-2 md:row-start-1 md:border-l md:border-line md:pl-10 print:border-0 print:pl-0">
        {children}
      </div>
      {margin ? (
        <aside
          aria-label="Around this page"
          className={`mt-6 grid content-start gap-5.5 border-t border-line pt-5 md:col-start-1 md:border-0 md:pt-0 md:pr-6 ${
            caution ? 'md:row-start-2 md:mt-5' : 'md:row-span-2 md:row-start-1 md:mt-0'
          }`}
        >
          {margin}
        </aside>
      ) : null}
    </main>
  );
}

/** One thing that is true around the work: who is waited for, who may act, the record. */
export function MarginNote({ title, children }: { title: ReactNode; children: ReactNode }) {
  return (
    <section className="text-sm text-ink-soft [&_p+p]:mt-1.5">
      <h2 className="mb-1 text-[0.96875rem] leading-normal text-ink">{title}</h2>
      {children}
    </section>
  );
}
