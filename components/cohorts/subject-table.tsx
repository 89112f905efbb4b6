import { StaticTable } from '../tables/static-table';
import type { Column } from '../tables/columns';
import { OutcomeMark } from '../ui/outcome-mark';
import { TimeInZone } from '../ui/time-in-zone';
import type { CohortWork, SubjectData } from './cohort-data';
import { outcomeWord } from './subject-facts';

type Key = 'place' | 'code' | 'site' | 'dosed' | 'dose' | 'window' | 'outcome' | 'onset';

/** Every subject of a cohort, read only. Times are those of each subject's site. */
export function SubjectTable({
  work,
  caption,
  subjects,
}: {
  work: CohortWork;
  caption: string;
  subjects: readonly (SubjectData & { readonly place: number })[];
}) {
  const columns: Column<Key>[] = [
    { key: 'place', header: 'Place' },
    { key: 'code', header: 'Subject', kind: 'code', rowHeader: true },
    { key: 'site', header: 'Site' },
    { key: 'dosed', header: 'Dosed' },
    { key: 'dose', header: 'Dose given', unit: work.dose.unit, kind: 'number' },
    { key: 'window', header: 'Window ends' },
    { key: 'outcome', header: 'Outcome' },
    { key: 'onset', header: 'Began' },
  ];
  const rows = subjects.map((subject) => {
    const zone = subject.site.timeZone;
    return {
      id: subject.id,
      values: {
        place: subject.place,
        code: subject.code,
        site: subject.site.name,
        dose: subject.doseGiven,
      },
      content: {
        code: <span className="font-mono text-[0.88em] whitespace-nowrap">{subject.code}</span>,
        dosed: subject.dosedAt ? <TimeInZone at={subject.dosedAt} zone={zone} /> : 'not yet',
        window: subject.windowEndsAt ? <TimeInZone at={subject.windowEndsAt} zone={zone} /> : undefined,
        outcome: (
          <OutcomeMark outcome={subject.outcome ?? 'pending'} word={outcomeWord(subject, work.labels)} />
        ),
        onset: subject.onsetAt ? <TimeInZone at={subject.onsetAt} zone={zone} /> : undefined,
      },
    };
  });
  const deviations = subjects.filter((subject) => subject.isDeviation);
  return (
    <>
      <StaticTable caption={caption} columns={columns} rows={rows} stacked />
      {deviations.length > 0 ? (
        <div className="mt-3.5">
          <h3 className="text-md">Deviations from the released dose</h3>
          <ul>
            {deviations.map((subject) => (
              <li key={subject.id} className="mt-1">
                <code>{subject.code}</code>: {subject.doseGiven} {work.dose.unit} given instead of{' '}
                {work.dose.text}. {subject.deviationReason}
              </li>
            ))}
          </ul>
        </div>
      ) : null}
    </>
  );
}
