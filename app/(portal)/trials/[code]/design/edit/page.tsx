import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { DesignForm } from '@/components/design/form/design-form';
import { designFormOffers } from '@/components/design/form/fresh-settings';
import { PageTitle } from '@/components/layout/page-title';
import { Sheet } from '@/components/layout/sheet';
import { ButtonLink } from '@/components/ui/button-link';
import { EmptyState } from '@/components/ui/empty-state';
import { Notice } from '@/components/ui/notice';
import { designEditPage } from '@/lib/queries/trial/design';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { requireReader } from '@/lib/server/session';
import { saveDesign } from '../actions';

export const metadata: Metadata = { title: 'Edit the design' };

/** The form of the design's draft, for the statisticians of the trial. */
export default async function EditDesignPage({ params }: { params: Promise<{ code: string }> }) {
  const reader = await requireReader();
  const view = await designEditPage(reader, (await params).code);
  if (view === null) notFound();
  const address = `/trials/${view.trialCode}/design`;
  if (view.why !== null) {
    return (
      <Sheet>
        <PageTitle>Edit the design</PageTitle>
        <EmptyState
          title="The design cannot be changed now"
          act={<ButtonLink href={address}>Read the design</ButtonLink>}
        >
          {view.why}
        </EmptyState>
      </Sheet>
    );
  }
  const design = view.draft?.design ?? designDefaults('levels');
  return (
    <Sheet>
      <PageTitle
        lede={
          view.draft
            ? 'Its consequences stand beside the form as you type.'
            : 'It begins as a sensible design: complete and change it. Its consequences stand beside the form as you type.'
        }
      >
        {view.draft ? `Edit the draft of version ${view.draft.number}` : 'Write the design'}
      </PageTitle>
      {view.returnedReason ? (
        <div className="mb-5">
          <Notice kind="waiting" title="Returned to draft" live={false}>
            {view.returnedReason}
          </Notice>
        </div>
      ) : null}
      <DesignForm
        trialCode={view.trialCode}
        design={design}
        offers={designFormOffers(design)}
        action={saveDesign}
      />
    </Sheet>
  );
}
