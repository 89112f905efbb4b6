import type { BelievedCurve } from '@/lib/design/advice';
import type { Design } from '@/lib/schemas/design';
import { WordsList } from '../words-list';
import { adviceInWords } from './advice-words';
import { impliedBelief, readBelief } from './belief';
import { CurveFigure } from './curve-figure';

/** A believed curve and the advice on a design under it. */
export function Believed({ design, curve }: { design: Design; curve: BelievedCurve }) {
  const { items, cautions } = adviceInWords(design, curve);
  return (
    <div className="@container">
      <div className="grid items-start gap-x-9 gap-y-4 @3xl:grid-cols-2">
        <CurveFigure design={design} curve={curve} />
        <div className="grid gap-4">
          {cautions.length > 0 ? (
            <ul className="grid gap-1.5 border-l-4 border-ochre bg-ochre-wash px-3.5 py-2.5">
              {cautions.map((caution) => (
                <li key={caution}>{caution}</li>
              ))}
            </ul>
          ) : null}
          <WordsList items={items} />
        </div>
      </div>
    </div>
  );
}

/** The curve a design's own settings take for granted; nothing where their numbers give no curve. */
export function BelievedByDesign({ design }: { design: Design }) {
  const read = readBelief(design, impliedBelief(design));
  if (!read.ok) return <p>The rule’s settings imply no curve that could be drawn.</p>;
  return (
    <div className="grid gap-3">
      <p className="max-w-prose text-sm text-ink-soft">
        The curve this rule’s settings take for granted, with the target at the middle of the doses.
      </p>
      <Believed design={design} curve={read.curve} />
    </div>
  );
}
