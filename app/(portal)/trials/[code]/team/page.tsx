import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import type { Column } from '@/components/tables/columns';
import { StaticTable } from '@/components/tables/static-table';
import { Chip } from '@/components/ui/chip';
import { EmptyState } from '@/components/ui/empty-state';
import { team, type TeamView } from '@/lib/queries/trial/team';
import { requireReader } from '@/lib/server/session';

export const metadata: Metadata = { title: 'Team' };

const memberColumns: Column<'name' | 'role' | 'sites' | 'since'>[] = [
  { key: 'name', header: 'Name', rowHeader: true },
  { key: 'role', header: 'Role' },
  { key: 'sites', header: 'Sites' },
  { key: 'since', header: 'Member since', kind: 'day' },
];

const siteColumns: Column<'name' | 'code' | 'state' | 'zone'>[] = [
  { key: 'name', header: 'Site', rowHeader: true },
  { key: 'code', header: 'Code', kind: 'code' },
  { key: 'state', header: 'State', kind: 'state' },
  { key: 'zone', header: 'Time zone' },
];

function Signing({ view }: { view: TeamView }) {
  const able = view.signers.filter((signer) => signer.maySign).length;
  return (
    <Section title="Signing">
      <p className="max-w-prose">
        {view.quorum === 1 ? 'One signature' : `${view.quorum} signatures`} on the same dose release it.{' '}
        {able === 1 ? 'One safety reviewer' : `${able} safety reviewers`} may sign.
        {able < view.quorum ? (
          <strong className="text-ochre"> That is fewer than the quorum: no dose can be released.</strong>
        ) : null}
      </p>
      {view.signers.length > 0 ? (
        <ul className="mt-2.5">
          {view.signers.map((signer) => (
            <li
              key={signer.personId}
              className="flex flex-wrap items-baseline gap-x-3 border-t border-line py-1.75"
            >
              <span className="font-semibold">{signer.printedName}</span>
              <Chip tone={signer.maySign ? 'moss' : 'ochre'}>
                {signer.maySign ? 'May sign' : 'May not sign'}
              </Chip>
              {signer.whyNot ? <span className="text-sm text-ink-soft">{signer.whyNot}</span> : null}
            </li>
          ))}
        </ul>
      ) : null}
    </Section>
  );
}

/** Who takes part in a trial, at which sites, and who may sign its steps. */
export default async function TeamPage({ params }: PageProps<'/trials/[code]/team'>) {
  const reader = await requireReader();
  const { code } = await params;
  const view = await team(reader, code);
  if (view === null) notFound();
  return (
    <Sheet
      margin={
        <MarginNote title="Who signs">
          <p>Nobody signs who ever recorded data of this trial, or proposed a version of its design.</p>
          <p>Roles and sites are granted by an administrator.</p>
        </MarginNote>
      }
    >
      <PageTitle>Team</PageTitle>
      <Section title="Members">
        <StaticTable
          caption="Members of the trial"
          stacked
          columns={memberColumns}
          rows={view.members.map((member) => ({
            id: member.personId,
            marked: member.isReader,
            values: {
              name: member.printedName,
              role: member.roleName,
              sites: member.siteNames.join(', '),
              since: member.memberSince,
            },
            content: {
              name: `${member.printedName}${member.isReader ? ' (you)' : ''}${member.isActive ? '' : ' (account disabled)'}`,
            },
          }))}
        />
      </Section>
      <Signing view={view} />
      <Section title="Sites">
        <StaticTable
          caption="Sites of the trial"
          stacked
          columns={siteColumns}
          rows={view.sites.map((site) => ({
            id: site.siteId,
            values: { name: site.name, code: site.code, state: site.state, zone: site.timeZone },
          }))}
          empty={<EmptyState title="No site yet">An administrator adds the sites of a trial.</EmptyState>}
        />
      </Section>
    </Sheet>
  );
}
