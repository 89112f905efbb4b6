'use client';

import { lazy } from 'react';
import { DisclosureHalt } from '@/components/ui/disclosure-halt';
import type { HaltAction } from './halt-form';

const HaltForm = lazy(() => import('./halt-form').then((module) => ({ default: module.HaltForm })));

/** Halting the trial in two clicks and a reason, from its header; the form is loaded by the first of them. */
export function HaltTrial({ trialCode, action }: { trialCode: string; action: HaltAction }) {
  return (
    <DisclosureHalt consequence="Nobody further is reserved or dosed, no dose is released, and everyone is told at once. Only the quorum of safety reviewers lifts a halt.">
      <HaltForm trialCode={trialCode} action={action} />
    </DisclosureHalt>
  );
}
