import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { Caution } from '@/components/caution/caution';
import { Comparison } from '@/components/design/comparison';
import { DesignInWords } from '@/components/design/design-in-words';
import { BelievedByDesign } from '@/components/design/preview/believed';
import { Explore } from '@/components/design/preview/explore';
import { FirstSteps } from '@/components/design/preview/first-steps-table';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { Sheet } from '@/components/layout/sheet';
import { ButtonLink } from '@/components/ui/button-link';
import { EmptyState } from '@/components/ui/empty-state';
import { Notice } from '@/components/ui/notice';
import { designPage, type DesignView, type ShownDesign } from '@/lib/queries/trial/design';
import { designAddressSchema } from '@/lib/schemas/design-address';
import { requireReader } from '@/lib/server/session';
import { DesignActs } from './design-acts';
import { DesignMargin } from './design-margin';

export const metadata: Metadata = { title: 'Design' };

/** The design of a trial in words, with its consequences, its versions, and the acts on it. */
export default async function DesignPage({
  params,
  searchParams,
}: {
  params: Promise<{ code: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}) {
  const reader = await requireReader();
  const view = await designPage(reader, (await params).code, designAddressSchema.parse(await searchParams));
  if (view === null) notFound();
  const { shown } = view;
  if (shown === null) return <NoDesign view={view} />;
  return (
    <Sheet caution={<Caution />} margin={<DesignMargin view={view} />}>
      <div className="mb-1 flex flex-wrap items-start justify-between gap-x-6 gap-y-3">
        <PageTitle lede={ledeOf(shown)}>Design, version {shown.number}</PageTitle>
        {view.edit && shown.state === 'draft' ? (
          <ButtonLink href={`/trials/${view.trialCode}/design/edit`}>Edit the draft</ButtonLink>
        ) : shown.approve || shown.return ? (
          <a href="#decision">To your decision</a>
        ) : null}
      </div>
      {shown.state === 'draft' && shown.returnedReason ? (
        <div className="mb-5">
          <Notice kind="waiting" title="Returned to draft" live={false}>
            {shown.returnedReason}
          </Notice>
        </div>
      ) : null}
      <DesignInWords design={shown.design} />
      <Section title="First steps">
        <Explore key={shown.versionId} what="steps" design={shown.design}>
          <FirstSteps design={shown.design} />
        </Explore>
      </Section>
      <Section title="A believed curve">
        <Explore key={shown.versionId} what="curve" design={shown.design}>
          <BelievedByDesign design={shown.design} />
        </Explore>
      </Section>
      {view.comparison ? (
        <Section title="What would each rule have recommended" id="comparison">
          <Comparison comparison={view.comparison} address={`/trials/${view.trialCode}/design`} />
        </Section>
      ) : null}
      <DesignActs view={view} shown={shown} printedName={reader.printedName} />
    </Sheet>
  );
}

function ledeOf(shown: ShownDesign): string {
  if (shown.isInForce) return 'In force: every recommendation of the trial is computed by it.';
  if (shown.state === 'approved') return 'Approved, and since replaced by a later version.';
  if (shown.state === 'submitted') {
    return 'Submitted: it waits for the approval of a safety reviewer who did not propose it.';
  }
  return 'A draft: nothing is computed by it until it is submitted and approved.';
}

function NoDesign({ view }: { view: DesignView }) {
  return (
    <Sheet>
      <PageTitle>Design</PageTitle>
      <EmptyState
        title="No design yet"
        act={
          view.edit ? (
            <ButtonLink variant="primary" href={`/trials/${view.trialCode}/design/edit`}>
              Write the design
            </ButtonLink>
          ) : undefined
        }
      >
        {view.edit
          ? 'The form begins with a sensible design that you complete and change.'
          : 'The trial’s statistician writes it. It is then submitted for approval.'}
      </EmptyState>
    </Sheet>
  );
}
