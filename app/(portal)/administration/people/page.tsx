import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import { InviteForm } from '@/components/administration/invite-form';
import { PersonSearch } from '@/components/administration/person-search';
import { PersonState } from '@/components/administration/state-chips';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { Sheet } from '@/components/layout/sheet';
import { DataTable } from '@/components/tables/data-table';
import { ROLE_NAMES } from '@/lib/policy/roles';
import { MOST_PEOPLE_LISTED, peopleList, type PersonLine } from '@/lib/queries/administration/people';
import { requireInstallationReader } from '@/lib/server/session';
import { invitePerson } from './actions';

export const metadata: Metadata = { title: 'People' };

function rolesOf({ isAdministrator, roles }: PersonLine): string {
  return [
    ...(isAdministrator ? [ROLE_NAMES.administrator] : []),
    ...roles.map(({ trialCode, role }) => `${ROLE_NAMES[role]} in ${trialCode}`),
  ].join(', ');
}

/** Everyone with an account, and the invitation of another. */
export default async function PeoplePage({
  searchParams,
}: {
  searchParams: Promise<{ search?: string | string[] }>;
}) {
  await requireInstallationReader('people.manage');
  const asked = (await searchParams).search;
  const search = (typeof asked === 'string' ? asked : '').trim().slice(0, 100);
  const { people, found } = await peopleList(search);
  return (
    <Sheet>
      <PageTitle lede="Everyone with an account. What a person did stays under their name when the account is disabled.">
        People
      </PageTitle>
      <Section
        title={search ? `People found by “${search}”` : 'Accounts'}
        aside={<a href="#invite">Invite a person</a>}
      >
        {found > MOST_PEOPLE_LISTED || search ? (
          <PersonSearch search={search} listed={people.length} found={found} />
        ) : null}
        <DataTable
          caption="People"
          what="people"
          csvName="people.csv"
          columns={[
            { key: 'name', header: 'Name', rowHeader: true },
            { key: 'email', header: 'E-mail' },
            { key: 'state', header: 'State' },
            { key: 'roles', header: 'Roles' },
            { key: 'created', header: 'Since', kind: 'day', hiddenAtFirst: true },
          ]}
          rows={people.map((person) => ({
            id: person.personId,
            values: {
              name: person.printedName,
              email: person.email,
              state: person.state,
              roles: rolesOf(person),
              created: person.createdAt,
            },
            content: {
              name: (
                <PageLink href={`/administration/people/${person.personId}`}>{person.printedName}</PageLink>
              ),
              state: <PersonState state={person.state} />,
            },
          }))}
          empty={<p className="text-ink-soft">Nobody is found by this.</p>}
        />
      </Section>
      <Section title="Invite a person" raised id="invite">
        <InviteForm action={invitePerson} />
      </Section>
    </Sheet>
  );
}
