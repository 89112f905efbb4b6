'use client';

import { useState } from 'react';

/** Copies a text, and says so. Without a clipboard (an unencrypted address) it says that too. */
export function CopyButton({ text, what }: { text: string; what: string }) {
  const [said, setSaid] = useState('');
  async function copy() {
    try {
      await navigator.clipboard.writeText(text);
      setSaid('Copied');
    } catch {
      setSaid('Not copied: select it by hand');
    }
  }
  return (
    <>
      <button
        type="button"
        onClick={copy}
        className="min-h-6 px-1 font-sans text-xs text-water underline underline-offset-3 print:hidden"
      >
        Copy<span className="sr-only"> {what}</span>
      </button>
      <span role="status" className="font-sans text-xs text-ink-soft">
        {said}
      </span>
    </>
  );
}
