import { Chip } from '../ui/chip';
import { DefinitionList } from '../ui/definition-list';
import { OutcomeMark } from '../ui/outcome-mark';
import { TimeInZone } from '../ui/time-in-zone';
import type { CohortWork, SubjectData } from './cohort-data';
import { TimeLeft } from './time-left';

/** Whether the observation window of a subject had ended when the page was made. */
export function hasWindowEnded(subject: SubjectData, readAt: string): boolean {
  return subject.windowEndsAt !== null && subject.windowEndsAt <= readAt;
}

/** How a subject's record stands, in a word. */
export function SubjectStanding({ subject, readAt }: { subject: SubjectData; readAt: string }) {
  if (subject.state === 'reserved') return <Chip tone="water">Reserved, not dosed</Chip>;
  if (subject.state === 'complete') return <Chip tone="moss">Complete</Chip>;
  if (hasWindowEnded(subject, readAt)) return <Chip tone="ochre">Outcome due</Chip>;
  return <Chip tone="water">In the window</Chip>;
}

/** The word of an outcome in the trial's own labels. */
export function outcomeWord(subject: Pick<SubjectData, 'outcome'>, labels: CohortWork['labels']): string {
  if (subject.outcome === null) return 'awaited';
  return subject.outcome === 'not-evaluable' ? 'not evaluable' : labels[subject.outcome];
}

/** What is on record of a subject, in the time of its site. */
export function SubjectFacts({ work, subject }: { work: CohortWork; subject: SubjectData }) {
  const zone = subject.site.timeZone;
  if (subject.dosedAt === null || subject.windowEndsAt === null) {
    return (
      <DefinitionList
        items={[{ term: 'Reserved', detail: <TimeInZone at={subject.reservedAt} zone={zone} /> }]}
      />
    );
  }
  const items = [
    {
      term: 'Dosed',
      detail: (
        <>
          {subject.doseGiven} {work.dose.unit}, <TimeInZone at={subject.dosedAt} zone={zone} />
          {subject.isDeviation ? (
            <span className="block text-sm">
              <span className="font-semibold text-ochre">Not the released dose.</span>{' '}
              {subject.deviationReason}
            </span>
          ) : null}
        </>
      ),
    },
    {
      term: 'Observation window',
      detail: (
        <>
          {hasWindowEnded(subject, work.readAt) ? 'ended ' : 'ends '}
          <TimeInZone at={subject.windowEndsAt} zone={zone} />
          {hasWindowEnded(subject, work.readAt) || subject.state === 'complete' ? null : (
            <span className="block font-semibold">
              <TimeLeft endsAt={subject.windowEndsAt} readAt={work.readAt} />
            </span>
          )}
        </>
      ),
    },
  ];
  if (subject.outcome !== null) {
    items.push({
      term: 'Outcome',
      detail: (
        <>
          <OutcomeMark outcome={subject.outcome} word={outcomeWord(subject, work.labels)} />
          {subject.onsetAt ? (
            <>
              , began <TimeInZone at={subject.onsetAt} zone={zone} />
            </>
          ) : null}
        </>
      ),
    });
  }
  return <DefinitionList items={items} />;
}
