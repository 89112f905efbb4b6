'use client';

import { usePathname } from 'next/navigation';
import { PageLink } from '../ui/page-link';

/** A place to go: its address and the word for it. */
export interface NavItem {
  href: string;
  label: string;
  /** Marks the item on this very address only, not on those below it. */
  exact?: boolean;
}

/** Whether an item of a navigation is the one the reader is at. */
export function isCurrent(item: NavItem, pathname: string): boolean {
  if (pathname === item.href) return true;
  return !item.exact && item.href !== '/' && pathname.startsWith(`${item.href}/`);
}

/** A link of the top bar or the trial's tabs; the current one is underlined in water and says so to screen readers. */
export function NavLink({ item, className = '' }: { item: NavItem; className?: string }) {
  const current = isCurrent(item, usePathname() ?? '');
  return (
    <PageLink
      href={item.href}

      aria-current={current ? 'page' : undefined}
      className={`inline-block border-b-2 whitespace-nowrap ${
        current ? 'border-water font-semibold text-ink' : 'border-transparent text-ink-soft hover:text-ink'
      } ${className}`}
    >
      {item.label}
    </PageLink>
  );
}
