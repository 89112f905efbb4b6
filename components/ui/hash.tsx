import { CopyButton } from './copy-button';

/** A digest cut to its ends, in groups of four: "7b1f 09c4 … e21a". A short one is shown whole. */
export function shortHash(hash: string): string {
  if (hash.length <= 16) return hash;
  return `${hash.slice(0, 4)} ${hash.slice(4, 8)} … ${hash.slice(-4)}`;
}

/**
 * A digest: short to the eye, whole to a screen reader, the pointer and the clipboard; printed whole.
 * @param what the word for it ("digest", "chain head")
 */
export function Hash({
  value,
  what = 'digest',
  copy = true,
}: {
  value: string;
  what?: string;
  copy?: boolean;
}) {
  return (
    <span className="font-mono text-xs">
      <span aria-hidden="true" title={value} className="print:hidden">
        {shortHash(value)}
      </span>
      <span className="sr-only print:not-sr-only print:break-all">{value}</span>
      {copy ? (
        <>
          {' '}
          <CopyButton text={value} what={what} />
        </>
      ) : null}
    </span>
  );
}
