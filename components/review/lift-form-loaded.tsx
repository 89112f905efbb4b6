'use client';

import { type ComponentProps, lazy, Suspense } from 'react';
import type { LiftForm } from './lift-form';

const Form = lazy(() => import('./lift-form').then((module) => ({ default: module.LiftForm })));

/** The form that lifts a halt, loaded only by the page of a trial that is halted. */
export function LoadedLiftForm(props: ComponentProps<typeof LiftForm>) {
  return (
    <Suspense fallback={<p className="text-ink-soft">Loading …</p>}>
      <Form {...props} />
    </Suspense>
  );
}
