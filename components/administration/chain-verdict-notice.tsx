import { Notice } from '@/components/ui/notice';
import { TimeInZone } from '@/components/ui/time-in-zone';

/** What verifying a chain found: whole, or the first broken link. */
export function ChainVerdictNotice({
  events,
  lastEventAt,
  firstBreak,
}: {
  events: number;
  lastEventAt: string | null;
  firstBreak: { sequence: number; eventId: string | null; sentence: string } | null;
}) {
  if (firstBreak !== null) {
    return (
      <Notice kind="error" title={`Broken at event ${firstBreak.sequence}`} live={false}>
        {firstBreak.sentence} Stop relying on what the trail says from there on, keep the database as it is,
        and find out who had access to it.
        {firstBreak.eventId ? <span className="block font-mono text-xs">{firstBreak.eventId}</span> : null}
      </Notice>
    );
  }
  return (
    <Notice kind="saved" title="Whole" live={false}>
      {events} event{events === 1 ? '' : 's'}, each linked to the one before and unchanged since
      {lastEventAt ? (
        <>
          ; the last <TimeInZone at={lastEventAt} precision="second" />
        </>
      ) : null}
      .
    </Notice>
  );
}
