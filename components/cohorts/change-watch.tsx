'use client';

import { useEffect, useState } from 'react';
import type { ChangeQuestion } from './change-question';
import { NoConnection } from './no-connection';

/** How often a page in view asks whether its cohort has changed, in milliseconds. */
const EVERY = 20_000;

/**
 * Says when somebody else has changed the cohort that is shown, and fetches the new state only when asked to: nothing
 * typed is lost. It says as well when the server cannot be reached. What it takes to ask is loaded with the first question,
 * not with the page.
 * @param revision the digest of what is shown
 */
export function ChangeWatch({
  trialCode,
  cohortNumber,
  revision,
}: {
  trialCode: string;
  cohortNumber: number;
  revision: string;
}) {
  const [Question, setQuestion] = useState<typeof ChangeQuestion | 'out-of-reach' | null>(null);
  useEffect(() => {
    let gone = false;
    let timer: number;
    const load = async () => {
      try {
        const loaded = await import('./change-question');
        if (!gone) setQuestion(() => loaded.ChangeQuestion);
      } catch {
        // Without a connection the code cannot be had; it is said, and tried again.
        if (gone) return;
        setQuestion('out-of-reach');
        timer = window.setTimeout(load, EVERY);
      }
    };
    timer = window.setTimeout(load, EVERY);
    return () => {
      gone = true;
      window.clearTimeout(timer);
    };
  }, []);
  return (
    <div role="status" className="print:hidden [&>*]:mb-5">
      {Question === 'out-of-reach' ? <NoConnection /> : null}
      {Question !== null && Question !== 'out-of-reach' ? (
        <Question trialCode={trialCode} cohortNumber={cohortNumber} revision={revision} every={EVERY} />
      ) : null}
    </div>
  );
}
