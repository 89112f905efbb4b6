import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import { notFound } from 'next/navigation';
import { ActForm } from '@/components/administration/act-form';
import { AddSiteForm } from '@/components/administration/add-site-form';
import { candidateChoices } from '@/components/administration/candidate-choices';
import { GrantForm } from '@/components/administration/grant-form';
import { PersonState } from '@/components/administration/state-chips';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { StaticTable } from '@/components/tables/static-table';
import { StateChip } from '@/components/ui/chip';
import { ROLE_NAMES } from '@/lib/policy/roles';
import { candidates, trialTeamPage, type TrialTeamPage } from '@/lib/queries/administration/trials';
import { trialCodeSchema } from '@/lib/schemas/trial-inputs';
import { requireInstallationReader } from '@/lib/server/session';
import { addSite, endMembership, grantMembership } from '../actions';

type Params = { params: Promise<{ code: string }> };

export async function generateMetadata({ params }: Params): Promise<Metadata> {
  const code = trialCodeSchema.safeParse((await params).code);
  return { title: code.success ? `Team of ${code.data}` : 'Team' };
}

function Team({ trial }: { trial: TrialTeamPage }) {
  return (
    <StaticTable
      caption="Team"
      stacked
      columns={[
        { key: 'name', header: 'Name', rowHeader: true },
        { key: 'role', header: 'Role' },
        { key: 'sites', header: 'Sites' },
        { key: 'granted', header: 'Granted', kind: 'day' },
        { key: 'ended', header: 'Ended', kind: 'day' },
        { key: 'acts', header: 'Act', acts: true },
      ]}
      rows={trial.members.map((member) => ({
        id: member.personId,
        values: {
          name: member.printedName,
          role: ROLE_NAMES[member.role],
          sites: member.sites.join(', '),
          granted: member.grantedAt,
          ended: member.endedAt,
        },
        content: {
          name: (
            <>
              <PageLink href={`/administration/people/${member.personId}`}>{member.printedName}</PageLink>
              {member.personState === 'active' ? null : (
                <>
                  {' '}
                  <PersonState state={member.personState} />
                </>
              )}
            </>
          ),
          acts:
            member.endedAt === null ? (
              <ActForm
                act="end-membership"
                values={{ trialCode: trial.code, personId: member.personId }}
                action={endMembership}
                name={`End the role of ${member.printedName}`}
                label="End role"
                pendingLabel="Ending…"
                small
              />
            ) : (
              <></>
            ),
        },
      }))}
    />
  );
}

/** A trial's sites and team. The administrator sees who may do what in it, and nothing of what was done. */
export default async function TrialTeamPageView({ params }: Params) {
  await requireInstallationReader('memberships.grant');
  const code = trialCodeSchema.safeParse((await params).code);
  const [trial, people] = code.success
    ? await Promise.all([trialTeamPage(code.data), candidates()])
    : [null, []];
  if (trial === null) notFound();
  const standing = trial.members.filter(({ endedAt }) => endedAt === null);
  const reviewers = standing.filter(({ role }) => role === 'reviewer').length;
  const isMember = new Set(standing.map(({ personId }) => personId));
  return (
    <Sheet
      margin={
        <>
          <MarginNote title="Separation of roles">
            <p>One role a person and trial.</p>
            <p>
              Nobody signs a step of a trial whose data they ever recorded, or whose design they proposed;
              such a grant is refused.
            </p>
            <p>You grant nothing to yourself, and no administrator holds a role in a trial.</p>
          </MarginNote>
          <MarginNote title="Before the trial can open">
            <p>
              It needs {trial.quorum} safety reviewers to sign; it has {reviewers}.
            </p>
          </MarginNote>
        </>
      }
    >
      <p className="mb-1 flex flex-wrap items-center gap-x-3 gap-y-1 text-sm">
        <PageLink href="/administration/trials">Trials</PageLink>
        <span className="font-mono text-xs">{trial.code}</span>
        <StateChip state={trial.state} />
      </p>
      <PageTitle>{trial.title}</PageTitle>
      <Section title="Team">
        <Team trial={trial} />
      </Section>
      <Section title="Grant a role" raised>
        <GrantForm
          trialCode={trial.code}
          people={candidateChoices(people.filter(({ personId }) => !isMember.has(personId)))}
          sites={trial.sites.map(({ siteId, code: siteCode, name }) => ({
            value: siteId,
            label: `${siteCode}, ${name}`,
          }))}
          action={grantMembership}
        />
      </Section>
      <Section title="Sites">
        <StaticTable
          caption="Sites"
          stacked
          columns={[
            { key: 'code', header: 'Code', kind: 'code', rowHeader: true },
            { key: 'name', header: 'Name' },
            { key: 'zone', header: 'Time zone' },
            { key: 'state', header: 'State', kind: 'state' },
          ]}
          rows={trial.sites.map((site) => ({
            id: site.siteId,
            values: {
              code: site.code,
              name: site.name,
              zone: site.timeZone.replaceAll('_', ' '),
              state: site.state,
            },
          }))}
          empty={<p className="text-ink-soft">None yet. Coordinators and investigators need one.</p>}
        />
        <div className="mt-5">
          {trial.sitesToAdd.length > 0 ? (
            <AddSiteForm
              trialCode={trial.code}
              sites={trial.sitesToAdd.map(({ siteId, code: siteCode, name }) => ({
                value: siteId,
                label: `${siteCode}, ${name}`,
              }))}
              action={addSite}
            />
          ) : (
            <p className="text-sm text-ink-soft">
              Every site there is takes part. <PageLink href="/administration/sites">Create another</PageLink>{' '}
              to add it here.
            </p>
          )}
        </div>
      </Section>
    </Sheet>
  );
}
