'use client';

import './globals.css';

/** Shown when even the frame of the page failed; it brings its own document, and every page loads it: it is short. */
export default function GlobalError({ retry }: { retry: () => void }) {
  return (
    <html lang="en">
      <body>
        <title>Something went wrong · Stepwell</title>
        <main className="mx-auto max-w-sheet px-4 pt-7">
          <h1 className="text-2xl">Something went wrong</h1>
          <p>The page could not be shown. Nothing you recorded before is lost.</p>
          <button type="button" onClick={() => retry()} className="mt-4 underline">
            Try again
          </button>
        </main>
      </body>
    </html>
  );
}
