import type { ReactNode } from 'react';
import { StateChip } from '../ui/chip';

/**
 * The header of every page of a trial: its state, code and title, what it seeks in one line, Halt, and the course.
 * @param state the trial's state (`open`, `in-review`, `closed-to-enrolment` …)
 * @param summary one line, such as "Target 0.25 dose-limiting toxicity · cohorts of 3 · levels 10 to 120 mg"
 * @param halt a `<DisclosureHalt>` for whoever may halt, nothing for others
 * @param course a `<Course>` of the data cut to this reader
 * @param tabs a `<TrialTabs>`
 */
export function TrialHeader({
  state,
  code,
  title,
  summary,
  halt,
  course,
  tabs,
}: {
  state: string;
  code: string;
  title: string;
  summary?: ReactNode;
  halt?: ReactNode;
  course?: ReactNode;
  tabs?: ReactNode;
}) {
  return (
    <section aria-label={`Trial ${code}`} className="border-b border-line bg-stone print:bg-transparent">
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-6 gap-y-4 px-4 pt-4 md:grid-cols-[330px_minmax(0,1fr)] md:px-8 md:pt-5 print:px-0">
        <div>
          <p className="flex flex-wrap items-center gap-x-3 gap-y-1">
            <StateChip state={state} />
            <span className="font-mono text-xs">{code}</span>
          </p>
          <p className="mt-2 font-serif text-xl font-medium tracking-[-0.005em] text-balance">{title}</p>
          {summary ? <p className="mt-1.5 max-w-[40ch] text-ink-soft">{summary}</p> : null}
          {halt ? <div className="mt-3 print:hidden">{halt}</div> : null}
        </div>
        {course ? <div className="min-w-0">{course}</div> : null}
      </div>
      <div className="px-4 pt-1 md:px-8 md:pt-3 print:hidden">{tabs}</div>
    </section>
  );
}
