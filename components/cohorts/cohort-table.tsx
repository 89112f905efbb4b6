import { PageLink } from '@/components/ui/page-link';
import { StaticTable } from '../tables/static-table';
import type { Column } from '../tables/columns';
import { StateChip } from '../ui/chip';

interface CohortLine {
  readonly number: number;
  readonly dose: string;
  readonly doseText: string;
  readonly standing: { readonly state: string; readonly word: string };
  readonly placesTaken: number;
  readonly size: number;
  readonly outcomesIn: number;
  readonly openedAt: string;
  readonly completedAt: string | null;
  readonly responses: { readonly present: number; readonly evaluable: number } | null;
  readonly ownSubjects: number | null;
}

type Key = 'number' | 'dose' | 'state' | 'places' | 'outcomes' | 'responses' | 'own' | 'opened' | 'completed';

/**
 * The cohorts of a trial, newest first, each a link to its page.
 * @param presentLabel the trial's word for a response, for those who see outcomes; null for the sites
 */
export function CohortTable({
  trialCode,
  cohorts,
  presentLabel,
}: {
  trialCode: string;
  cohorts: readonly CohortLine[];
  presentLabel: string | null;
}) {
  const seesResponses = cohorts.some((cohort) => cohort.responses !== null);
  const columns: Column<Key>[] = [
    { key: 'number', header: 'Cohort', rowHeader: true },
    { key: 'dose', header: 'Released dose', strong: true },
    { key: 'state', header: 'State' },
    { key: 'places', header: 'Places taken' },
    { key: 'outcomes', header: 'Outcomes in' },
    seesResponses
      ? { key: 'responses', header: presentLabel ?? 'Responses' }
      : { key: 'own', header: 'Of your site' },
    { key: 'opened', header: 'Opened', kind: 'day' },
    { key: 'completed', header: 'Completed', kind: 'day' },
  ];
  const rows = [...cohorts].reverse().map((cohort) => ({
    id: String(cohort.number),
    marked: cohort.standing.state === 'open' || cohort.standing.state === 'returned',
    values: {
      dose: cohort.doseText,
      places: `${cohort.placesTaken} of ${cohort.size}`,
      outcomes: `${cohort.outcomesIn} of ${cohort.size}`,
      responses: cohort.responses ? `${cohort.responses.present} of ${cohort.responses.evaluable}` : null,
      own: cohort.ownSubjects === null ? null : String(cohort.ownSubjects),
      opened: cohort.openedAt,
      completed: cohort.completedAt,
    },
    content: {
      number: (
        <PageLink href={`/trials/${trialCode}/cohorts/${cohort.number}`}>Cohort {cohort.number}</PageLink>
      ),
      state: <StateChip state={cohort.standing.state} word={cohort.standing.word} />,
    },
  }));
  return <StaticTable caption="Cohorts of the trial" columns={columns} rows={rows} stacked />;
}
