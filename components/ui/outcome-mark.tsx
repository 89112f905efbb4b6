/** present: a filled mark · absent: an open one · not-evaluable: a crossed one · pending: a dashed one */
export type Outcome = 'present' | 'absent' | 'not-evaluable' | 'pending';

/** The mark alone, 13 px, for a line of text; the word must stand beside it. */
export function OutcomeSymbol({ outcome }: { outcome: Outcome }) {
  return (
    <svg
      width="13"
      height="13"
      viewBox="0 0 13 13"
      aria-hidden="true"
      className="inline-block align-[-2px] print:align-[-1px]"
    >
      <circle
        cx="6.5"
        cy="6.5"
        r="5.5"
        strokeWidth="2"
        strokeDasharray={outcome === 'pending' ? '2 2.2' : undefined}
        className={outcome === 'present' ? 'fill-ink stroke-ink' : 'fill-paper stroke-ink'}
      />
      {outcome === 'not-evaluable' ? (
        <path d="M2.6 2.6 10.4 10.4M10.4 2.6 2.6 10.4" strokeWidth="1.6" className="fill-none stroke-ink" />
      ) : null}
    </svg>
  );
}

/** The outcome of a subject: the mark with its word, in the trial's own labels. */
export function OutcomeMark({ outcome, word }: { outcome: Outcome; word: string }) {
  return (
    <span className="inline-flex items-baseline gap-1.75">
      <span className="translate-y-px">
        <OutcomeSymbol outcome={outcome} />
      </span>
      {word}
    </span>
  );
}

/** The key to the marks: the trial's labels for present and absent, and the others where they occur. */
export function OutcomeLegend({
  labels,
  also = [],
}: {
  labels: { present: string; absent: string };
  also?: ('not-evaluable' | 'pending')[];
}) {
  const words: [Outcome, string][] = [
    ['present', labels.present],
    ['absent', labels.absent],
  ];
  for (const outcome of also) words.push([outcome, outcome === 'pending' ? 'awaited' : 'not evaluable']);
  return (
    <ul className="flex flex-wrap gap-x-3.5 gap-y-1 text-xs text-ink-soft">
      {words.map(([outcome, word]) => (
        <li key={outcome}>
          <OutcomeMark outcome={outcome} word={word} />
        </li>
      ))}
    </ul>
  );
}
