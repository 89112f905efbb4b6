'use client';

import dynamic from 'next/dynamic';
import { useState, type ReactNode } from 'react';
import { SkeletonFigure } from '@/components/ui/skeleton';
import { Button } from '@/components/ui/button';
import type { Design } from '@/lib/schemas/design';

const explorers = {
  steps: dynamic(() => import('./steps-preview').then((module) => module.StepsPreview), {
    ssr: false,
    loading: () => <SkeletonFigure />,
  }),
  curve: dynamic(() => import('./believed-curve').then((module) => module.BelievedCurve), {
    ssr: false,
    loading: () => <SkeletonFigure />,
  }),
} as const;

const LABELS = {
  steps: 'See the steps from another dose',
  curve: 'Try your own belief',
} as const;

/**
 * A consequence of a design as the server drew it, and a button that fetches the mathematics to try another.
 * @param children the drawing for the starting dose, or for the belief the rule takes for granted
 */
export function Explore({
  what,
  design,
  children,
}: {
  what: keyof typeof explorers;
  design: Design;
  children: ReactNode;
}) {
  const [isOpen, setOpen] = useState(false);
  const Explorer = explorers[what];
  if (isOpen) return <Explorer design={design} />;
  return (
    <div className="grid gap-3">
      {children}
      <div>
        <Button small onClick={() => setOpen(true)}>
          {LABELS[what]}
        </Button>
      </div>
    </div>
  );
}
