import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { Caution } from '@/components/caution/caution';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { EmptyState } from '@/components/ui/empty-state';
import { TimeInZone } from '@/components/ui/time-in-zone';
import { reviewPage, type ReviewView, type StandingSignature } from '@/lib/queries/trial/review';
import { requireReader } from '@/lib/server/session';
import { Lift } from './lift';
import { Packet } from './packet';

export const metadata: Metadata = { title: 'Review' };

/** The review page: the packet that waits for signatures, or the halt that waits to be lifted. */
export default async function ReviewPage({ params }: { params: Promise<{ code: string }> }) {
  const reader = await requireReader();
  const view = await reviewPage(reader, (await params).code);
  if (view === null) notFound();
  return (
    <Sheet caution={<Caution />} margin={<ReviewMargin view={view} />}>
      {view.lift ? <Lift view={view.lift} trial={view} printedName={reader.printedName} /> : null}
      {view.packet ? <Packet packet={view.packet} trial={view} printedName={reader.printedName} /> : null}
      {view.idle ? (
        <>
          <PageTitle>Review</PageTitle>
          <EmptyState title="Nothing waits for signatures">{view.idle}</EmptyState>
          {view.lastRelease ? (
            <Section title={`${view.lastRelease.dose} released for cohort ${view.lastRelease.cohortNumber}`}>
              <p className="mb-3 text-ink-soft">
                The last decision, on <TimeInZone at={view.lastRelease.releasedAt} zone="UTC" />.
              </p>
              <div className="grid gap-3">
                {view.lastRelease.signatures.map((signature) => (
                  <Signed key={signature.printedName} signature={signature} />
                ))}
              </div>
            </Section>
          ) : null}
        </>
      ) : null}
    </Sheet>
  );
}

function Signed({ signature }: { signature: StandingSignature }) {
  return (
    <p>
      <span className="font-semibold text-moss">{signature.printedName}</span>
      <br />“{signature.meaning}”
      <br />
      <TimeInZone at={signature.signedAt} zone="UTC" />
      {signature.reason ? (
        <>
          <br />
          Reason: {signature.reason}
        </>
      ) : null}
    </p>
  );
}

function ReviewMargin({ view }: { view: ReviewView }) {
  const waiting = view.packet ?? view.lift;
  if (waiting === null) return null;
  const { signatures, sign } = waiting;
  return (
    <>
      <MarginNote title="Waiting for">
        <p>
          {view.quorum} signatures on the same decision; {signatures.length}{' '}
          {signatures.length === 1 ? 'stands' : 'stand'} now.
        </p>
        {view.packet ? (
          <p>
            Waiting since <TimeInZone at={view.packet.computedAt} zone="UTC" />.
          </p>
        ) : null}
      </MarginNote>
      {signatures.length > 0 ? (
        <MarginNote title="Signed so far">
          {signatures.map((signature) => (
            <Signed key={signature.printedName + signature.signedAt} signature={signature} />
          ))}
        </MarginNote>
      ) : null}
      <MarginNote title="You may not sign if">
        <p>you ever recorded data of this trial, or proposed its design.</p>
        {sign?.why ? <p className="font-semibold text-brick">{sign.why}</p> : null}
      </MarginNote>
      {view.packet ? (
        <MarginNote title="Record">
          <p className="font-mono text-xs break-all">
            digest {view.packet.digest.slice(0, 4)} {view.packet.digest.slice(4, 8)} …{' '}
            {view.packet.digest.slice(-4)}
            <br />
            design version {view.packet.designVersion}
            <br />
            revision {view.packet.revision}
            <br />
            {view.packet.softwareVersion}
          </p>
        </MarginNote>
      ) : null}
    </>
  );
}
