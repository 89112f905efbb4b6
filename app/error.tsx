'use client';

import { PageTitle } from '@/components/layout/page-title';
import { Sheet } from '@/components/layout/sheet';
import { Button } from '@/components/ui/button';

/** The reference under which the server logged the error, when it did. */
function referenceOf(error: unknown): string | undefined {
  return error instanceof Error && 'digest' in error && typeof error.digest === 'string'
    ? error.digest
    : undefined;
}

/** Shown when a page could not be made: what to do, and the reference to quote. */
export default function ErrorPage({ error, retry }: { error: unknown; retry: () => void }) {
  const reference = referenceOf(error);
  return (
    <Sheet>
      <PageTitle lede="The page could not be shown. Nothing you recorded before is lost. Try again; if it happens again, tell the administrator.">
        Something went wrong
      </PageTitle>
      {reference ? (
        <p>
          Reference <code>{reference}</code>
        </p>
      ) : null}
      <p className="mt-4">
        <Button onClick={() => retry()}>Try again</Button>
      </p>
    </Sheet>
  );
}
