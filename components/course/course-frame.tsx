'use client';

import { useEffect, useRef, type ReactNode } from 'react';

/**
 * The frame a wide course scrolls in; it opens at the current cohort.
 * @param at the place of the current cohort, as a share of the drawing's width
 */
export function CourseFrame({ at, children }: { at: number; children: ReactNode }) {
  const frame = useRef<HTMLDivElement>(null);
  useEffect(() => {
    const box = frame.current;
    if (box) box.scrollLeft = at * box.scrollWidth - box.clientWidth / 2;
  }, [at]);
  return (
    <div
      ref={frame}
      role="group"
      aria-label="Course of doses"
      tabIndex={0}
      className="frame-scroll -mx-4 flex pr-4 md:mx-0 md:pr-0 print:overflow-visible"
    >
      {children}
    </div>
  );
}
