import { MarginNote } from '@/components/layout/sheet';
import { StateChip } from '@/components/ui/chip';
import { PageLink } from '@/components/ui/page-link';
import { TimeInZone } from '@/components/ui/time-in-zone';
import type { DesignVersionLine, DesignView } from '@/lib/queries/trial/design';

/** What is true around a design: who is waited for, who approved it, its versions, its digest. */
export function DesignMargin({ view }: { view: DesignView }) {
  const { shown } = view;
  return (
    <>
      {shown?.state === 'submitted' ? (
        <MarginNote title="Waiting for">
          <p>the signature of a safety reviewer who did not propose the design.</p>
          {shown.submittedAt ? (
            <p>
              Submitted on <TimeInZone at={shown.submittedAt} zone="UTC" /> by {shown.proposedBy}.
            </p>
          ) : null}
        </MarginNote>
      ) : null}
      {shown && shown.approvals.length > 0 ? (
        <MarginNote title="Approved by">
          {shown.approvals.map((approval) => (
            <p key={approval.signedAt}>
              <span className="font-semibold text-moss">{approval.printedName}</span>
              <br />“{approval.meaning}”
              <br />
              <TimeInZone at={approval.signedAt} zone="UTC" />
            </p>
          ))}
        </MarginNote>
      ) : null}
      <MarginNote title="Versions">
        <ul className="grid gap-2.5">
          {view.versions.map((version) => (
            <VersionLine key={version.number} version={version} trialCode={view.trialCode} />
          ))}
        </ul>
      </MarginNote>
      {shown ? (
        <MarginNote title="Record">
          <p className="font-mono text-xs break-all">
            digest {shown.digest.slice(0, 4)} {shown.digest.slice(4, 8)} … {shown.digest.slice(-4)}
          </p>
        </MarginNote>
      ) : null}
    </>
  );
}

function VersionLine({ version, trialCode }: { version: DesignVersionLine; trialCode: string }) {
  const { number, isShown, isInForce, state, proposedBy } = version;
  const at = version.approvedAt ?? version.submittedAt ?? version.savedAt;
  const name = `Version ${number}`;
  return (
    <li>
      <span className="mr-2 font-semibold text-ink">
        {isShown ? (
          name
        ) : (
          <PageLink
            href={`/trials/${trialCode}/design?version=${number}`}

            className="text-water underline underline-offset-3"
          >
            {name}
          </PageLink>
        )}
      </span>
      <StateChip
        state={isInForce ? 'approved' : state}
        word={isInForce ? 'In force' : state === 'approved' ? 'Replaced' : undefined}
      />
      <br />
      {proposedBy}, <TimeInZone at={at} zone="UTC" />
    </li>
  );
}
