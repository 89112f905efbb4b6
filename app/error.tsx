'use client';

/** The reference under which the server logged the error, when it did. */
function referenceOf(error: unknown): string | undefined {
  return error instanceof Error && 'digest' in error && typeof error.digest === 'string'
    ? error.digest
    : undefined;
}

/** The look of a button (components/ui/button.tsx), whose code every page would load for this one. */
const BUTTON =
  'min-h-11 rounded-sm border-[1.5px] border-water px-5 py-2 font-semibold text-water hover:bg-water-wash hover:text-water-deep';

/** Shown when a page could not be made: what to do, and the reference to quote. */
export default function ErrorPage({ error, retry }: { error: unknown; retry: () => void }) {
  const reference = referenceOf(error);
  return (
    <main id="work" className="mx-auto max-w-sheet px-4 pt-4.5 md:px-8 md:pt-7">
      <h1 className="text-2xl">Something went wrong</h1>
      <p className="mt-1.5 max-w-prose text-ink-soft">
        The page could not be shown. Nothing you recorded before is lost. Try again; if it happens again, tell
        the administrator.
      </p>
      {reference ? (
        <p className="mt-4">
          Reference <code>{reference}</code>
        </p>
      ) : null}
      <p className="mt-4">
        <button type="button" onClick={() => retry()} className={BUTTON}>
          Try again
        </button>
      </p>
    </main>
  );
}
