'use client';

import { useRef, type ReactNode } from 'react';
import { buttonClass } from './button';

/**
 * Halting in two clicks: the first opens the reason in place, the second (in the form given) halts.
 * It opens before the page's scripts have run; Escape closes it.
 * @param label the act, such as "Halt the trial"
 * @param consequence what a halt does and who can lift it
 * @param children the form with the reason and its button
 */
export function DisclosureHalt({
  label = 'Halt the trial',
  consequence,
  children,
}: {
  label?: string;
  consequence?: ReactNode;
  children: ReactNode;
}) {
  const box = useRef<HTMLDetailsElement>(null);
  return (
    <details
      ref={box}
      className="group"
      onToggle={() => {
        if (box.current?.open) box.current.querySelector<HTMLElement>('textarea, input')?.focus();
      }}
      onKeyDown={(event) => {
        if (event.key !== 'Escape' || !box.current) return;
        box.current.open = false;
        box.current.querySelector('summary')?.focus();
      }}
    >
      <summary
        className={`${buttonClass('danger', true)} list-none group-open:bg-brick-wash [&::-webkit-details-marker]:hidden`}
      >
        {label}
      </summary>
      <div className="mt-3 max-w-prose border-l-4 border-brick bg-paper px-3.5 py-3">
        {consequence ? <p className="mb-3 text-sm">{consequence}</p> : null}
        {children}
      </div>
    </details>
  );
}
