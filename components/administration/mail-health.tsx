import { TimeInZone } from '@/components/ui/time-in-zone';

/** A mail that may be sent waits this long at most while a worker runs. */
const LONGEST_WAIT_MILLISECONDS = 60_000;

/** Whether the worker sends mail, as far as the outbox tells. */
export function MailHealth({
  isHeld,
  lastActiveAt,
  oldestDueMailAt,
  now,
}: {
  isHeld: boolean;
  lastActiveAt: string | null;
  oldestDueMailAt: string | null;
  now: string;
}) {
  const waited = oldestDueMailAt === null ? 0 : Date.parse(now) - Date.parse(oldestDueMailAt);
  return (
    <>
      {lastActiveAt === null ? (
        'Has not sent a mail yet'
      ) : (
        <>
          Last sent or tried a mail <TimeInZone at={lastActiveAt} precision="second" />
        </>
      )}
      {isHeld ? '. Mail is held: no mail server is configured.' : null}
      {!isHeld && waited > LONGEST_WAIT_MILLISECONDS && oldestDueMailAt ? (
        <strong className="block text-brick">
          A mail waits since <TimeInZone at={oldestDueMailAt} /> although it is due: the worker does not seem
          to run. Start Stepwell again, and look into its log.
        </strong>
      ) : null}
      {!isHeld && waited <= LONGEST_WAIT_MILLISECONDS ? '. No mail is overdue.' : null}
    </>
  );
}
