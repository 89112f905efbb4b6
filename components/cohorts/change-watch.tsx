'use client';

import { useQuery } from '@tanstack/react-query';
import { useRouter } from 'next/navigation';
import { useTransition } from 'react';
import { Button } from '../ui/button';
import { Notice } from '../ui/notice';

/** How often a page in view asks whether its cohort has changed, in milliseconds. */
const EVERY = 20_000;

class AnswerError extends Error {
  readonly status: number;

  constructor(status: number) {
    super(`The server answered ${status}.`);
    this.status = status;
  }
}

async function fetchRevision(trialCode: string, number: number, signal: AbortSignal): Promise<string> {
  const address = `/api/trials/${encodeURIComponent(trialCode)}/cohorts/${number}`;
  const response = await fetch(address, { signal, headers: { accept: 'application/json' } });
  if (!response.ok) throw new AnswerError(response.status);
  // The schema library is fetched with the first question asked, not with the page.
  const { cohortRevisionSchema } = await import('@/lib/schemas/cohort-revision');
  return cohortRevisionSchema.parse(await response.json()).revision;
}

/**
 * Says when somebody else has changed the cohort that is shown, and fetches the new state only when asked to: nothing
 * typed is lost. It says as well when the server cannot be reached.
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
  const router = useRouter();
  const [isRefreshing, startRefreshing] = useTransition();
  const { data, error } = useQuery({
    queryKey: ['cohort-revision', trialCode, cohortNumber, revision],
    queryFn: ({ signal }) => fetchRevision(trialCode, cohortNumber, signal),
    initialData: revision,
    refetchInterval: EVERY,
    retry: 1,
  });
  const hasChanged = data !== revision;
  const isOut = error instanceof AnswerError && (error.status === 401 || error.status === 404);
  return (
    <div role="status" className="print:hidden">
      {hasChanged ? (
        <div className="mb-5">
          <Notice kind="waiting" title="Somebody else changed this cohort." live={false}>
            <p className="mb-2">What is shown here is older. What you have typed stays.</p>
            <Button
              small
              pending={isRefreshing}
              pendingLabel="Fetching…"
              onClick={() => startRefreshing(() => router.refresh())}
            >
              Show the new state
            </Button>
          </Notice>
        </div>
      ) : error ? (
        <div className="mb-5">
          <Notice
            kind="waiting"
            title={isOut ? 'You are signed out, or may no longer see this.' : 'No connection to the server.'}
            live={false}
          >
            {isOut
              ? 'What is shown here may be out of date. Sign in in another tab to go on; what you have typed stays.'
              : 'What is shown here may be out of date. A record is kept only when the page says “Recorded”.'}
          </Notice>
        </div>
      ) : null}
    </div>
  );
}
