import type { ReactNode } from 'react';
import { TrialTabs } from '@/components/layout/trial-tabs';
import { requireInstallationReader } from '@/lib/server/session';

const PLACES = [
  { href: '/administration', label: 'Overview', exact: true },
  { href: '/administration/people', label: 'People' },
  { href: '/administration/sites', label: 'Sites' },
  { href: '/administration/trials', label: 'Trials' },
  { href: '/administration/mail', label: 'Mail' },
  { href: '/administration/health', label: 'Health' },
];

/** The frame of the administration's pages; each asks for its reader again. */
export default async function AdministrationLayout({ children }: { children: ReactNode }) {
  await requireInstallationReader('people.manage');
  return (
    <>
      <div className="border-b border-line bg-stone px-4 pt-1 md:px-8 print:hidden">
        <TrialTabs tabs={PLACES} label="Administration" />
      </div>
      {children}
    </>
  );
}
