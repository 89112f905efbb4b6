'use client';

import './globals.css';
import ErrorPage from './error';

/** Shown when even the frame of the page failed; it brings its own document. */
export default function GlobalError(props: { error: unknown; retry: () => void }) {
  return (
    <html lang="en">
      <body>
        <title>Something went wrong · Stepwell</title>
        <ErrorPage {...props} />
      </body>
    </html>
  );
}
