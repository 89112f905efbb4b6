import type { ReactNode } from 'react';

/**
 * The title of a page, in the voice of a protocol, with an optional sentence below.
 * @param lede one or two sentences that say what holds, at most 70 characters a line
 */
export function PageTitle({ children, lede }: { children: ReactNode; lede?: ReactNode }) {
  return (
    <header className="mb-5.5">
      <h1 className="max-w-[32ch] text-[1.4375rem] leading-tight md:text-2xl">{children}</h1>
      {lede ? <p className="mt-1.5 max-w-prose text-ink-soft">{lede}</p> : null}
    </header>
  );
}
