'use client';

import { useRef, type ReactNode } from 'react';
import { buttonClass } from '../ui/button';

/**
 * An act that is not the next one, folded away: its form opens in place, keeps what was typed when it is folded again,
 * and closes with Escape.
 * @param isNext shows the form unfolded for good: it has become the next act
 */
export function ActDisclosure({
  label,
  isNext = false,
  children,
}: {
  label: string;
  isNext?: boolean;
  children: ReactNode;
}) {
  const box = useRef<HTMLDetailsElement>(null);
  return (
    <details
      ref={box}
      open={isNext || undefined}
      onToggle={() => {
        if (box.current?.open && !isNext) {
          box.current.querySelector<HTMLElement>('input:not(:disabled), textarea, select')?.focus();
        }
      }}
      onKeyDown={(event) => {
        if (event.key !== 'Escape' || isNext || !box.current?.open) return;
        box.current.open = false;
        box.current.querySelector('summary')?.focus();
      }}
    >
      <summary
        className={
          isNext
            ? 'hidden'
            : `${buttonClass('secondary', true)} min-h-9 list-none [&::-webkit-details-marker]:hidden`
        }
      >
        {label}
      </summary>
      <div className={isNext ? '' : 'mt-3 mb-2 border-l-4 border-line pl-4'}>{children}</div>
    </details>
  );
}
