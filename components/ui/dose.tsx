/** A dose: a number with its unit, never broken over two lines. `value` is the exact text ("12.5"). */
export function Dose({ value, unit }: { value: string | number; unit: string }) {
  return (
    <span className="tabular whitespace-nowrap">
      {value}
      {'\u00a0'}
      {unit}
    </span>
  );
}

/** How many digits a number's text has after the point. */
export function decimalsOf(text: string): number {
  const point = text.indexOf('.');
  return point < 0 ? 0 : text.length - point - 1;
}

/**
 * A number for a right-aligned column of a table: filled up with invisible digits to `decimals`, so that the points of
 * a column stand below each other. What is read and copied is the number alone.
 */
export function AlignedNumber({
  value,
  decimals,
  unit,
}: {
  value: string | number | null | undefined;
  decimals: number;
  unit?: string;
}) {
  if (value === null || value === undefined || value === '') {
    return <span className="text-ink-soft">–</span>;
  }
  const text = String(value);
  const own = decimalsOf(text);
  const missing = Math.max(0, decimals - own);
  const padding = missing === 0 ? '' : `${own === 0 ? '.' : ''}${'0'.repeat(missing)}`;
  return (
    <span className="tabular whitespace-nowrap">
      <span data-padding={padding} className="after:invisible after:content-[attr(data-padding)]">
        {text.replace('-', '\u2212')}
      </span>
      {unit ? `\u00a0${unit}` : null}
    </span>
  );
}
