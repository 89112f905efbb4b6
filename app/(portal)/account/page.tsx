import type { Metadata } from 'next';
import { ChangePasswordForm } from '@/components/account/change-password-form';
import { EndSessionForm } from '@/components/account/end-session-form';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { DefinitionList } from '@/components/ui/definition-list';
import { formatTime } from '@/components/ui/format-time';
import { TimeInZone } from '@/components/ui/time-in-zone';
import { ROLE_NAMES } from '@/lib/policy/roles';
import { ownSessions, type OwnSession } from '@/lib/queries/own-sessions';
import { requestTime } from '@/lib/server/request-time';
import { requireReader, type Reader } from '@/lib/server/session';
import { changePassword, endSession } from './actions';

export const metadata: Metadata = { title: 'Your account' };

function Roles({ reader }: { reader: Reader }) {
  if (!reader.isAdministrator && reader.memberships.length === 0) return 'None yet.';
  return (
    <ul>
      {reader.isAdministrator ? <li>{ROLE_NAMES.administrator} of the installation</li> : null}
      {reader.memberships.map(({ trialId, trialCode, trialTitle, role }) => (
        <li key={trialId}>
          {ROLE_NAMES[role]} in{' '}
          <a href={`/trials/${trialCode}`} title={trialTitle}>
            {trialCode}
          </a>
        </li>
      ))}
    </ul>
  );
}

function SessionLine({ session, isThis }: { session: OwnSession; isThis: boolean }) {
  return (
    <li className="grid grid-cols-[minmax(0,1fr)_6rem] items-center gap-x-4 border-b border-line py-2">
      <span>
        Begun <TimeInZone at={session.createdAt} />, last used <TimeInZone at={session.lastSeenAt} />
      </span>
      {isThis ? (
        <span className="text-right text-sm text-ink-soft">This one</span>
      ) : (
        <EndSessionForm
          sessionId={session.id}
          begun={formatTime(session.createdAt, 'UTC', 'minute')}
          action={endSession}
        />
      )}
    </li>
  );
}

/** The reader's own account: who they are here, their password, where they are signed in. */
export default async function AccountPage() {
  const reader = await requireReader();
  const sessions = await ownSessions(reader.personId, await requestTime());
  return (
    <Sheet
      margin={
        <MarginNote title="Name and address">
          <p>They stand beside what you record and sign, so they stay as they are.</p>
        </MarginNote>
      }
    >
      <PageTitle>Your account</PageTitle>
      <Section title="Who you are here">
        <DefinitionList
          items={[
            { term: 'Printed name', detail: reader.printedName },
            { term: 'E-mail address', detail: <span className="break-words">{reader.email}</span> },
            { term: 'Roles', detail: <Roles reader={reader} /> },
          ]}
        />
      </Section>
      <Section title="Password">
        <div className="max-w-md">
          <ChangePasswordForm action={changePassword} />
        </div>
      </Section>
      <Section title="Where you are signed in">
        <ul>
          {sessions.map((session) => (
            <SessionLine key={session.id} session={session} isThis={session.id === reader.sessionId} />
          ))}
        </ul>
        <p className="mt-2 max-w-prose text-sm text-ink-soft">
          A session ends after 30 minutes without use, and 12 hours after signing in. Ended sessions are not
          listed.
        </p>
      </Section>
    </Sheet>
  );
}
