'use client';

import { Suspense, useEffect, useRef, useState, type ReactNode } from 'react';
import { buttonClass } from './button';

/** Puts the focus on the first field as soon as it is there. */
function FocusFirst({ children }: { children: ReactNode }) {
  const box = useRef<HTMLDivElement>(null);
  useEffect(() => box.current?.querySelector<HTMLElement>('textarea, input:not([type=hidden])')?.focus(), []);
  return <div ref={box}>{children}</div>;
}

/**
 * Halting in two clicks: the first opens the reason in place, the second (in the form given) halts. Escape closes it.
 * The form is only rendered once it is open, so that it may be a component loaded at that moment.
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
  const [opened, setOpened] = useState(false);
  return (
    <details
      ref={(element) => {
        box.current = element;
        // A click before the page's scripts ran has opened it already, and nobody heard.
        if (element?.open) setOpened(true);
      }}
      className="group"
      onToggle={() => {
        if (!box.current?.open) return;
        setOpened(true);
        box.current.querySelector<HTMLElement>('textarea, input:not([type=hidden])')?.focus();
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
        {opened ? (
          <Suspense
            fallback={
              <p role="status" className="text-sm text-ink-soft">
                Loading …
              </p>
            }
          >
            <FocusFirst>{children}</FocusFirst>
          </Suspense>
        ) : null}
      </div>
    </details>
  );
}
