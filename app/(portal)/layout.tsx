import type { ReactNode } from 'react';
import { SessionWatch } from '@/components/account/session-watch';
import type { NavItem } from '@/components/layout/nav-link';
import { TopBar } from '@/components/layout/top-bar';
import { rolesInWords } from '@/lib/policy/roles-in-words';
import { requestTime } from '@/lib/server/request-time';
import { requireReader, type Reader } from '@/lib/server/session';
import { SignOutButton } from './sign-out-button';

function placesOf(reader: Reader): NavItem[] {
  return [
    { href: '/today', label: 'Today' },
    { href: '/trials', label: 'Trials' },
    ...(reader.isAdministrator ? [{ href: '/administration', label: 'Administration' }] : []),
  ];
}

/** The frame of every page for who is signed in. Each page asks for its reader again: this does not run at each step. */
export default async function PortalLayout({ children }: { children: ReactNode }) {
  const reader = await requireReader();
  return (
    <>
      <TopBar
        nav={placesOf(reader)}
        person={{ name: reader.printedName, role: rolesInWords(reader), href: '/account' }}
        signOut={<SignOutButton />}
      />
      {children}
      <SessionWatch left={Date.parse(reader.sessionEndsAt) - (await requestTime())} />
    </>
  );
}
