import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import { notFound } from 'next/navigation';
import { PersonActs } from '@/components/administration/person-acts';
import { PersonState } from '@/components/administration/state-chips';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { StaticTable } from '@/components/tables/static-table';
import { DefinitionList } from '@/components/ui/definition-list';
import { TimeInZone } from '@/components/ui/time-in-zone';
import { ROLE_NAMES } from '@/lib/policy/roles';
import { personPage, type PersonPage } from '@/lib/queries/administration/people';
import { idSchema } from '@/lib/schemas/trial-inputs';
import { requireInstallationReader } from '@/lib/server/session';
import { disablePerson, enablePerson, resendInvitation, resetPassword } from '../actions';

export const metadata: Metadata = { title: 'Person' };

function LinkLine({ person }: { person: PersonPage }) {
  const { link, state } = person;
  if (link) {
    return (
      <>
        {link.purpose === 'invitation' ? 'Invitation' : 'Link for a new password'} made{' '}
        <TimeInZone at={link.createdAt} />, works until <TimeInZone at={link.expiresAt} />
      </>
    );
  }
  return state === 'invited' ? 'None works any more; send the invitation again.' : 'None';
}

/** One person's account: state, roles, and what an administrator may do about it. */
export default async function PersonPageView({ params }: { params: Promise<{ personId: string }> }) {
  const reader = await requireInstallationReader('people.manage');
  const personId = idSchema.safeParse((await params).personId);
  const person = personId.success ? await personPage(personId.data) : null;
  if (person === null) notFound();
  return (
    <Sheet
      margin={
        <MarginNote title="Accounts are never deleted">
          <p>What a person recorded or signed stays under their printed name.</p>
          <p>Disabling ends every session at once and keeps the roles; end those on the trial’s page.</p>
        </MarginNote>
      }
    >
      <p className="mb-1 text-sm">
        <PageLink href="/administration/people">People</PageLink>
      </p>
      <PageTitle>{person.printedName}</PageTitle>
      <Section title="Account">
        <DefinitionList
          items={[
            { term: 'State', detail: <PersonState state={person.state} /> },
            { term: 'E-mail address', detail: person.email },
            {
              term: 'Administrator',
              detail: person.isAdministrator ? 'Yes; holds no role in any trial' : 'No',
            },
            { term: 'Invited', detail: <TimeInZone at={person.createdAt} /> },
            { term: 'Link', detail: <LinkLine person={person} /> },
            {
              term: 'Signed in',
              detail:
                person.openSessions === 0
                  ? 'Nowhere'
                  : `In ${person.openSessions} browser${person.openSessions === 1 ? '' : 's'}`,
            },
          ]}
        />
      </Section>
      <Section title="Roles in trials">
        <StaticTable
          caption="Roles in trials"
          stacked
          columns={[
            { key: 'trial', header: 'Trial', kind: 'code', rowHeader: true },
            { key: 'role', header: 'Role' },
            { key: 'sites', header: 'Sites' },
            { key: 'granted', header: 'Granted', kind: 'day' },
            { key: 'ended', header: 'Ended', kind: 'day' },
          ]}
          rows={person.memberships.map((membership) => ({
            id: membership.trialCode,
            values: {
              trial: membership.trialCode,
              role: ROLE_NAMES[membership.role],
              sites: membership.sites.join(', '),
              granted: membership.grantedAt,
              ended: membership.endedAt,
            },
            content: {
              trial: (
                <PageLink href={`/administration/trials/${membership.trialCode}`}>
                  {membership.trialCode}
                </PageLink>
              ),
            },
          }))}
          empty={
            <p className="text-ink-soft">
              {person.isAdministrator
                ? 'None; administrators hold no role in a trial.'
                : 'None yet. Roles are granted on the page of a trial.'}
            </p>
          }
        />
      </Section>
      <Section title="What to do" raised>
        <PersonActs
          person={{ personId: person.personId, printedName: person.printedName, state: person.state }}
          isOneself={person.personId === reader.personId}
          actions={{ disablePerson, enablePerson, resendInvitation, resetPassword }}
        />
      </Section>
    </Sheet>
  );
}
