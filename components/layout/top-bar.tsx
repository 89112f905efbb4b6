import type { ReactNode } from 'react';
import { Brand } from './brand';
import { NavLink, type NavItem } from './nav-link';
import { PhoneMenu } from './phone-menu';
import { PageLink } from '../ui/page-link';

/**
 * The bar at the top of every page: the mark, where one can go, who one is.
 * @param nav the places this person may go to, in order
 * @param person the name and the role under which this page is read; left out when signed out
 * @param signOut the form or link that signs out
 */
export function TopBar({
  nav,
  person,
  signOut,
}: {
  nav: NavItem[];
  person?: { name: string; role?: string; href?: string };
  signOut?: ReactNode;
}) {
  const who = person ? (
    <span className="leading-tight">
      {person.href ? (
        <PageLink href={person.href} className="hover:text-ink hover:underline">
          {person.name}
        </PageLink>
      ) : (
        person.name
      )}
      {person.role ? <span className="block">{person.role}</span> : null}
    </span>
  ) : null;
  return (
    <header className="relative flex items-center gap-3.5 border-b border-line px-4 py-2 md:gap-7 md:px-8 md:py-3 print:border-0 print:px-0">
      <PageLink href="/" aria-label="Stepwell, to Today" className="rounded-sm">
        <Brand />
      </PageLink>
      {nav.length > 0 ? (
        <nav aria-label="Main" className="hidden gap-5.5 md:flex print:hidden">
          {nav.map((item) => (
            <NavLink key={item.href} item={item} className="pb-0.5" />
          ))}
        </nav>
      ) : null}
      <div className="ml-auto flex items-center gap-4 text-right text-[0.84375rem] text-ink-soft print:hidden">
        {who ? <span className="hidden sm:block">{who}</span> : null}
        {signOut ? <span className="hidden md:block">{signOut}</span> : null}
        {nav.length > 0 || signOut ? (
          <PhoneMenu>
            {person ? <p className="pb-2 text-left sm:hidden">{who}</p> : null}
            <nav aria-label="Main" className="grid text-left text-md">
              {nav.map((item) => (
                <NavLink key={item.href} item={item} className="w-fit py-2.5" />
              ))}
            </nav>
            {signOut ? <div className="mt-2 border-t border-line pt-3 text-left">{signOut}</div> : null}
          </PhoneMenu>
        ) : null}
      </div>
    </header>
  );
}
