'use client';

import { Suspense, useId, useRef, useState, type ReactNode } from 'react';
import { Button, type ButtonVariant } from './button';
import { SkeletonText } from './skeleton';

/**
 * A button that opens a part of the page in place: a second form, a detail. What is inside is only rendered once it is
 * open, so that it may be a component loaded at that moment (`lazy(() => import(…))`). Escape closes it.
 */
export function Disclosure({
  label,
  variant = 'secondary',
  small = true,
  children,
}: {
  label: ReactNode;
  variant?: ButtonVariant;
  small?: boolean;
  children: ReactNode;
}) {
  const [open, setOpen] = useState(false);
  const button = useRef<HTMLButtonElement>(null);
  const id = useId();
  function close() {
    setOpen(false);
    button.current?.focus();
  }
  return (
    <div
      onKeyDown={(event) => {
        if (event.key === 'Escape' && open) close();
      }}
    >
      <Button
        ref={button}
        variant={variant}
        small={small}
        aria-expanded={open}
        aria-controls={id}
        onClick={() => setOpen(!open)}
      >
        {label}
      </Button>
      <div id={id} hidden={!open} className="mt-3">
        {open ? <Suspense fallback={<SkeletonText />}>{children}</Suspense> : null}
      </div>
    </div>
  );
}
