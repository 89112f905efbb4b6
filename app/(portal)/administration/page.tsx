import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import type { ReactNode } from 'react';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { ButtonLink } from '@/components/ui/button-link';
import { DefinitionList } from '@/components/ui/definition-list';
import { Hash } from '@/components/ui/hash';
import { Notice } from '@/components/ui/notice';
import { TimeInZone } from '@/components/ui/time-in-zone';
import { mailIsHeld } from '@/lib/queries/administration/mail';
import { administrationOverview, type AdministrationOverview } from '@/lib/queries/administration/overview';
import { requireInstallationReader } from '@/lib/server/session';

export const metadata: Metadata = { title: 'Administration' };

const count = (number: number, one: string, many = `${one}s`): string =>
  `${number} ${number === 1 ? one : many}`;

/** What an administrator should do something about, most pressing first. */
function concerns(
  { mail, staleInvitations, administrators }: AdministrationOverview,
  isHeld: boolean,
): ReactNode[] {
  return [
    isHeld ? (
      <Notice key="held" kind="waiting" title="Mail is held" live={false}>
        No mail server is configured, so {count(mail.queued, 'mail')} wait and nobody is told of anything. Set
        SMTP_URL and start again; nothing is lost meanwhile.
      </Notice>
    ) : null,
    mail.dead > 0 ? (
      <Notice key="dead" kind="error" title={`${count(mail.dead, 'mail')} given up`} live={false}>
        The mail server refused {mail.dead === 1 ? 'it' : 'them'} again and again.{' '}
        <PageLink href="/administration/mail?state=dead">See why, and try again</PageLink>.
      </Notice>
    ) : null,
    staleInvitations > 0 ? (
      <Notice key="stale" kind="note" title={`${count(staleInvitations, 'invitation')} ran out`} live={false}>
        The link was not used in time. <PageLink href="/administration/people">Find who is invited</PageLink>{' '}
        and send it again.
      </Notice>
    ) : null,
    administrators === 1 ? (
      <Notice key="alone" kind="note" title="One administrator" live={false}>
        You are the only one. Invite a second, who can help when you cannot sign in.
      </Notice>
    ) : null,
  ].filter((notice) => notice !== null);
}

/** What the installation holds, and what needs doing. */
export default async function AdministrationPage() {
  const reader = await requireInstallationReader('people.manage');
  const overview = await administrationOverview();
  const { people, sites, trials, mail, trail } = overview;
  const notices = concerns(overview, mailIsHeld(reader.installationKind));
  return (
    <Sheet
      margin={
        <>
          <MarginNote title="What an administrator does">
            <p>Creates trials and names their first statistician; manages people, sites, roles and mail.</p>
            <p>Sees no clinical data, grants nothing to themselves and signs nothing.</p>
          </MarginNote>
          <MarginNote title="Record">
            <p>Every act here is an event of the installation’s chain, with who did it and when.</p>
            {trail.head ? (
              <p>
                Chain head <Hash value={trail.head} what="chain head" />
              </p>
            ) : null}
          </MarginNote>
        </>
      }
    >
      <PageTitle lede="The installation: people, sites, trials, mail and health.">Administration</PageTitle>
      {notices.length > 0 ? <div className="mb-5.5 grid gap-3">{notices}</div> : null}
      <Section
        title="The installation now"
        aside={
          <ButtonLink href="/administration/people#invite" variant="primary" small>
            Invite a person
          </ButtonLink>
        }
      >
        <DefinitionList
          items={[
            {
              term: 'People',
              detail: (
                <>
                  <PageLink href="/administration/people">{people.active} active</PageLink>, {people.invited}{' '}
                  invited, {people.disabled} disabled
                </>
              ),
            },
            { term: 'Administrators', detail: count(overview.administrators, 'active', 'active') },
            {
              term: 'Sites',
              detail: <PageLink href="/administration/sites">{count(sites, 'site')}</PageLink>,
            },
            {
              term: 'Trials',
              detail: <PageLink href="/administration/trials">{count(trials, 'trial')}</PageLink>,
            },
            {
              term: 'Mail',
              detail: (
                <>
                  <PageLink href="/administration/mail">{mail.queued} waiting</PageLink>, {mail.sent} sent,{' '}
                  {mail.dead} given up
                  {overview.oldestQueuedAt ? (
                    <>
                      ; the oldest waits since <TimeInZone at={overview.oldestQueuedAt} />
                    </>
                  ) : null}
                </>
              ),
            },
            {
              term: 'Trail of the installation',
              detail: (
                <>
                  {count(trail.events, 'event')}
                  {trail.lastEventAt ? (
                    <>
                      , the last <TimeInZone at={trail.lastEventAt} />
                    </>
                  ) : null}
                  . <PageLink href="/administration/health">Verify it</PageLink>
                </>
              ),
            },
          ]}
        />
      </Section>
    </Sheet>
  );
}
