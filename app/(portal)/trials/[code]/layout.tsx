import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import type { ReactNode } from 'react';
import { Course } from '@/components/course/course';
import { TrialHeader } from '@/components/layout/trial-header';
import { TrialTabs } from '@/components/layout/trial-tabs';
import { HaltTrial } from '@/components/trial/halt-trial';
import { Notice } from '@/components/ui/notice';
import { trialHeader } from '@/lib/queries/trial/trial-header';
import { requireReader } from '@/lib/server/session';
import { haltTrial } from './actions';
import { courseData } from './course-data';

interface Props {
  readonly params: Promise<{ code: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { code } = await params;
  return { title: { default: code, template: `%s · ${code} · Stepwell` } };
}

/** The header of a trial on every page of it: what it is, how it stands, its course of doses, and Halt. */
export default async function TrialLayout({ params, children }: Props & { children: ReactNode }) {
  const reader = await requireReader();
  const { code } = await params;
  const header = await trialHeader(reader, code);
  if (header === null) notFound();
  return (
    <>
      <TrialHeader
        state={header.state}
        code={header.code}
        title={header.title}
        summary={header.summary}
        halt={header.mayHalt ? <HaltTrial trialCode={header.code} action={haltTrial} /> : undefined}
        course={header.course ? <Course data={courseData(header.course)} /> : undefined}
        tabs={<TrialTabs tabs={header.tabs.map((tab, index) => ({ ...tab, exact: index === 0 }))} />}
      />
      {header.halt ? (
        <div className="px-4 pt-4 md:px-8">
          <Notice kind="refused" title="The trial is halted" live={false}>
            Nobody is reserved or dosed and no dose is released. Outcomes and corrections go on. Reason:{' '}
            {header.halt.reason}
          </Notice>
        </div>
      ) : null}
      {children}
    </>
  );
}
