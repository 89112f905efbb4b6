'use client';

import { useQuery } from '@tanstack/react-query';
import { useRouter } from 'next/navigation';
import { useTransition } from 'react';
import { QueryProvider } from '../query-provider';
import { Button } from '../ui/button';
import { Notice } from '../ui/notice';
import { NoConnection } from './no-connection';

interface Props {
  readonly trialCode: string;
  readonly cohortNumber: number;
  /** The digest of what is shown. */
  readonly revision: string;
  /** How often it is asked, in milliseconds. */
  readonly every: number;
}

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
  const { cohortRevisionSchema } = await import('@/lib/schemas/cohort-revision');
  return cohortRevisionSchema.parse(await response.json()).revision;
}

function Question({ trialCode, cohortNumber, revision, every }: Props) {
  const router = useRouter();
  const [isRefreshing, startRefreshing] = useTransition();
  const { data, error } = useQuery({
    queryKey: ['cohort-revision', trialCode, cohortNumber, revision],
    queryFn: ({ signal }) => fetchRevision(trialCode, cohortNumber, signal),
    refetchInterval: every,
    retry: 1,
  });
  if (data !== undefined && data !== revision) {
    return (
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
    );
  }
  if (!error) return null;
  const isOut = error instanceof AnswerError && (error.status === 401 || error.status === 404);
  if (!isOut) return <NoConnection />;
  return (
    <Notice kind="waiting" title="You are signed out, or may no longer see this." live={false}>
      What is shown here may be out of date. Sign in in another tab to go on; what you have typed stays.
    </Notice>
  );
}

/** Asks the server at once and from then on whether the cohort has changed since it was shown, and says so. */
export function ChangeQuestion(props: Props) {
  return (
    <QueryProvider>
      <Question {...props} />
    </QueryProvider>
  );
}
