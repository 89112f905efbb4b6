import type { Metadata } from 'next';
import { MailHealth } from '@/components/administration/mail-health';
import { ChainVerdictNotice } from '@/components/administration/chain-verdict-notice';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { DefinitionList } from '@/components/ui/definition-list';
import { Hash } from '@/components/ui/hash';
import { Notice } from '@/components/ui/notice';
import { TimeInZone } from '@/components/ui/time-in-zone';
import { BREAK_WORDS } from '@/lib/conduct/chain';
import { installationHealth, type InstallationHealth } from '@/lib/queries/administration/health';
import { mailIsHeld } from '@/lib/queries/administration/mail';
import { requireInstallationReader } from '@/lib/server/session';

export const metadata: Metadata = { title: 'Health' };

const KINDS = {
  production: 'In earnest',
  demo: 'Demo: invented people, mail is caught',
  test: 'Test: the clock may be moved',
} as const;

function Migrations({ migrations }: { migrations: InstallationHealth['migrations'] }) {
  const { ran, pending, unknown, lastName, lastRanAt } = migrations;
  if (pending.length > 0) {
    return (
      <Notice kind="error" title={`${pending.length} migrations have not run`} live={false}>
        The first is {pending[0]}. Start once with DATABASE_OWNER_URL.
      </Notice>
    );
  }
  if (unknown.length > 0) {
    return (
      <Notice kind="error" title="The database is newer than this server" live={false}>
        It ran {unknown[0]}, which this server does not know. Start the newer version.
      </Notice>
    );
  }
  return (
    <>
      All {ran} have run; the last, {lastName}
      {lastRanAt ? (
        <>
          , <TimeInZone at={lastRanAt} />
        </>
      ) : null}
    </>
  );
}

/** Whether database, migrations, worker and trail are in order. */
export default async function HealthPage() {
  const reader = await requireInstallationReader('installation-trail.read');
  const health = await installationHealth();
  const { database, migrations, trail } = health;
  return (
    <Sheet
      margin={
        <MarginNote title="The whole trail">
          <p>
            This page verifies the installation’s own chain.{' '}
            <code className="font-mono text-xs">npm run verify-trail</code> on the server verifies every
            trial’s too, and names the first broken link.
          </p>
        </MarginNote>
      }
    >
      <PageTitle lede="Read and verified just now, when this page was loaded.">Health</PageTitle>
      <Section title="Trail of the installation">
        <ChainVerdictNotice
          events={trail.events}
          lastEventAt={trail.lastEventAt}
          firstBreak={
            trail.firstBreak && {
              sequence: trail.firstBreak.sequence,
              eventId: trail.firstBreak.eventId,
              sentence: BREAK_WORDS[trail.firstBreak.reason],
            }
          }
        />
        {trail.head ? (
          <p className="mt-3">
            Chain head <Hash value={trail.head} what="chain head" />
          </p>
        ) : null}
      </Section>
      <Section title="Parts">
        <DefinitionList
          items={[
            { term: 'Installation', detail: KINDS[health.kind] },
            {
              term: 'Database',
              detail: `MariaDB ${database.version}, answered in ${database.answeredInMilliseconds.toFixed(1)} ms`,
            },
            { term: 'Database clock', detail: <TimeInZone at={health.databaseTime} precision="second" /> },
            { term: 'Migrations', detail: <Migrations migrations={migrations} /> },
            {
              term: 'Worker',
              detail: (
                <MailHealth
                  isHeld={mailIsHeld(reader.installationKind)}
                  lastActiveAt={health.workerLastActiveAt}
                  oldestDueMailAt={health.oldestDueMailAt}
                  now={health.databaseTime}
                />
              ),
            },
          ]}
        />
      </Section>
    </Sheet>
  );
}
