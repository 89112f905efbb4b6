'use client';

import { usePathname } from 'next/navigation';
import { useEffect, useRef, type ReactNode } from 'react';

/** The menu of the top bar on a phone: a native disclosure that closes when one has gone somewhere, or on Escape. */
export function PhoneMenu({ children }: { children: ReactNode }) {
  const menu = useRef<HTMLDetailsElement>(null);
  const pathname = usePathname();
  useEffect(() => {
    if (menu.current) menu.current.open = false;
  }, [pathname]);
  return (
    <details
      ref={menu}
      className="group md:hidden"
      onKeyDown={(event) => {
        if (event.key !== 'Escape' || !menu.current?.open) return;
        menu.current.open = false;
        menu.current.querySelector('summary')?.focus();
      }}
    >
      <summary className="flex min-h-11 list-none items-center rounded-sm border border-line px-3 font-semibold group-open:bg-stone [&::-webkit-details-marker]:hidden">
        Menu
      </summary>
      <div className="absolute inset-x-0 top-full z-30 border-b border-line bg-paper px-4 py-3">
        {children}
      </div>
    </details>
  );
}
