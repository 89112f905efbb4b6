import type { PrintContext } from '@/lib/design/trace/format';
import type { TraceLine } from '@/lib/design/trace/line';
import { printLine, type PrintedLine } from '@/lib/design/trace/segments';
import { Formula } from './formula';

/**
 * The way from data to dose, line by line: what, how, and what came of it. A line that changed the value or the dose has a
 * bar and a wash, its note says from what to what and why; screen readers hear "changed".
 *
 * @param caption names the table, for example "How 60 mg was reached"; read out, shown only if `captionVisible`
 * @param context how numbers and doses are printed, from `printContext(design)`
 */
export function TraceTable({
  lines,
  context,
  caption,
  captionVisible = false,
}: {
  lines: readonly TraceLine[];
  context: PrintContext;
  caption: string;
  captionVisible?: boolean;
}) {
  const printed = lines.map((line) => printLine(line, context));
  const sources = [...new Set(printed.flatMap((line) => line.source ?? []))];
  return (
    <div className="frame-scroll">
      <table className="w-full border-collapse tabular">
        <caption className={captionVisible ? 'mb-2.5 text-left font-serif text-lg' : 'sr-only'}>
          {caption}
        </caption>
        <thead className="sr-only">
          <tr>
            <th scope="col">Step</th>
            <th scope="col">Computation</th>
            <th scope="col">Result</th>
          </tr>
        </thead>
        <tbody>
          {printed.map((line, i) => (
            <Row key={i} line={line} />
          ))}
        </tbody>
      </table>
      {sources.length > 0 && <p className="mt-2 text-xs text-ink-soft">Source: {sources.join('. ')}.</p>}
    </div>
  );
}

function Row({ line }: { line: PrintedLine }) {
  return (
    <tr
      className={`border-b border-line align-top ${line.acted ? 'bg-water-wash shadow-[inset_3px_0_0_var(--color-water)]' : ''}`}
    >
      <th scope="row" className="w-[34%] py-1.5 pr-3 pl-2 text-left font-normal text-ink-soft">
        {line.step !== null && (
          <>
            <span className="sr-only">Step</span> {line.step}{' '}
          </>
        )}
        <Formula segments={line.label} />
      </th>
      <td className="py-1.5 pr-3">
        <Formula segments={line.formula} />
        {line.note !== null && (
          <span className="block text-sm text-ink-soft">
            <Formula segments={line.note} />
          </span>
        )}
      </td>
      <td className="py-1.5 pr-2 text-right font-semibold whitespace-nowrap">
        <Formula segments={line.result} />
        {line.acted && <span className="sr-only">, changed</span>}
      </td>
    </tr>
  );
}
