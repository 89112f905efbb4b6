import type { ReactNode } from 'react';

/** saved: recorded · refused: not recorded, with the reason · error: something went wrong · waiting: someone is waited for · note: anything else */
export type NoticeKind = 'saved' | 'refused' | 'error' | 'waiting' | 'note';

const look: Record<NoticeKind, string> = {
  saved: 'border-moss bg-stone',
  refused: 'border-brick bg-brick-wash',
  error: 'border-brick bg-brick-wash',
  waiting: 'border-ochre bg-ochre-wash',
  note: 'border-water bg-water-wash',
};
const titleTone: Record<NoticeKind, string> = {
  saved: 'text-moss',
  refused: 'text-brick',
  error: 'text-brick',
  waiting: 'text-ochre',
  note: 'text-water-deep',
};

/**
 * A sentence about what just happened or what holds. Refusals and errors interrupt a screen reader; the rest waits.
 * @param title one short sentence, such as "Not recorded."
 * @param live false for a notice that was there when the page was made: it is not announced
 * @param reference the number under which an error stands in the log
 */
export function Notice({
  kind,
  title,
  children,
  reference,
  live = true,
}: {
  kind: NoticeKind;
  title?: ReactNode;
  children?: ReactNode;
  reference?: string;
  live?: boolean;
}) {
  const role = kind === 'refused' || kind === 'error' ? 'alert' : 'status';
  return (
    <div role={live ? role : undefined} className={`border-l-4 px-3.5 py-2.5 ${look[kind]}`}>
      {title ? <p className={`font-semibold ${titleTone[kind]}`}>{title}</p> : null}
      {children ? <div className="max-w-prose">{children}</div> : null}
      {reference ? (
        <p className="mt-1 text-sm">
          Reference <code>{reference}</code>
        </p>
      ) : null}
    </div>
  );
}
