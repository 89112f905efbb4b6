'use client';

import { usePathname } from 'next/navigation';
import { useEffect, useRef } from 'react';
import { NavLink, type NavItem } from './nav-link';

/** The pages of a trial. On a phone the row scrolls inside its own frame and opens at the current page. */
export function TrialTabs({ tabs, label = 'Trial' }: { tabs: NavItem[]; label?: string }) {
  const frame = useRef<HTMLElement>(null);
  const pathname = usePathname();
  useEffect(() => {
    const row = frame.current;
    const current = row?.querySelector<HTMLElement>('[aria-current="page"]');
    if (row && current) row.scrollLeft = current.offsetLeft - (row.clientWidth - current.offsetWidth) / 2;
  }, [pathname]);
  return (
    <nav
      ref={frame}
      aria-label={label}
      className="frame-scroll relative -mx-4 flex gap-4.5 px-4 md:mx-0 md:gap-6 md:px-0"
    >
      {tabs.map((tab) => (
        <NavLink key={tab.href} item={tab} className="pt-1.5 pb-[0.4375rem]" />
      ))}
    </nav>
  );
}
