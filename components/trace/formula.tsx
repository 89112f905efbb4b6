import { Fragment } from 'react';
import type { Segment } from '@/lib/design/trace/format';

/** Pieces of a formula, raised and lowered ones as such. */
export function Formula({ segments }: { segments: readonly Segment[] }) {
  return segments.map((segment, i) => {
    if (segment.shift === 'sub') return <sub key={i}>{segment.text}</sub>;
    if (segment.shift === 'sup') return <sup key={i}>{segment.text}</sup>;
    return <Fragment key={i}>{segment.text}</Fragment>;
  });
}
