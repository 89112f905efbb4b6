/** Lines of text that are on their way. */
export function SkeletonText({ lines = 3 }: { lines?: number }) {
  return (
    <div role="status" className="grid animate-pulse gap-2.5 py-1">
      <span className="sr-only">Loading</span>
      {Array.from({ length: lines }, (_, line) => (
        <span
          key={line}
          aria-hidden="true"
          className={`h-3.5 rounded-sm bg-line/60 ${line === lines - 1 ? 'w-2/3' : 'w-full max-w-prose'}`}
        />
      ))}
    </div>
  );
}

/** A drawing or chart that is on its way. */
export function SkeletonFigure() {
  return (
    <div role="status" className="h-full min-h-40 w-full animate-pulse rounded-sm bg-line/40">
      <span className="sr-only">Loading</span>
    </div>
  );
}
