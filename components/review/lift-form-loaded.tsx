'use client';

import { lazy } from 'react';

/** The form that lifts a halt, loaded only by the page of a trial that is halted. */
export const LoadedLiftForm = lazy(() =>
  import('./lift-form').then((module) => ({ default: module.LiftForm })),
);
