import type { Metadata } from 'next';
import { SiteForm } from '@/components/administration/site-form';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { Sheet } from '@/components/layout/sheet';
import { DataTable } from '@/components/tables/data-table';
import { EmptyState } from '@/components/ui/empty-state';
import { siteList } from '@/lib/queries/administration/sites';
import { requireInstallationReader } from '@/lib/server/session';
import { createSite } from './actions';

export const metadata: Metadata = { title: 'Sites' };

/** Every site, and the making of another. */
export default async function SitesPage() {
  await requireInstallationReader('sites.manage');
  const sites = await siteList();
  return (
    <Sheet>
      <PageTitle lede="The places where subjects are treated. A site takes part in a trial once it was added to it.">
        Sites
      </PageTitle>
      <Section title="All sites">
        <DataTable
          caption="Sites"
          what="sites"
          columns={[
            { key: 'code', header: 'Code', kind: 'code', rowHeader: true },
            { key: 'name', header: 'Name' },
            { key: 'zone', header: 'Time zone' },
            { key: 'trials', header: 'Trials' },
            { key: 'created', header: 'Since', kind: 'day', hiddenAtFirst: true },
          ]}
          rows={sites.map((site) => ({
            id: site.siteId,
            values: {
              code: site.code,
              name: site.name,
              zone: site.timeZone.replaceAll('_', ' '),
              trials: site.trials.join(', '),
              created: site.createdAt,
            },
          }))}
          empty={<EmptyState title="No site yet">Create the first one below.</EmptyState>}
        />
      </Section>
      <Section title="Create a site" raised>
        <SiteForm timeZones={['UTC', ...Intl.supportedValuesOf('timeZone')]} action={createSite} />
      </Section>
    </Sheet>
  );
}
