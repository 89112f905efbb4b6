'use client';

import dynamic from 'next/dynamic';
import { useRouter } from 'next/navigation';
import { useEffect } from 'react';
import { useWatch } from 'react-hook-form';
import { ActionForm } from '@/components/forms/action-form';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { type FormAction, useActionForm } from '@/components/forms/use-action-form';
import { PageLink } from '@/components/ui/page-link';
import { SkeletonFigure } from '@/components/ui/skeleton';
import type { Design, DesignInput } from '@/lib/schemas/design';
import type { TrialFormSchemas } from '@/lib/schemas/trial-forms';
import { CohortsSection } from './cohorts-section';
import { DosesSection } from './doses-section';
import { FinalEstimateSection } from './final-estimate-section';
import type { DesignFormOffers } from './fresh-settings';
import { GuardrailsSection } from './guardrails-section';
import { LiveCheck } from './live-check';
import { ResponseSection } from './response-section';
import { RuleSection } from './rule-section';
import { StoppingSection } from './stopping-section';

const schema = trialSchema('save-design');

const LivePanel = dynamic(() => import('../preview/live-panel').then((module) => module.LivePanel), {
  ssr: false,
  loading: () => <SkeletonFigure />,
});

/** The form of a design's draft, with its consequences beside it. */
export function DesignForm({
  trialCode,
  design,
  offers,
  action,
}: {
  trialCode: string;
  /** The draft as last saved, or the design to start from. */
  design: Design;
  offers: DesignFormOffers;
  action: FormAction<TrialFormSchemas['save-design'], unknown>;
}) {
  const router = useRouter();
  const state = useActionForm<TrialFormSchemas['save-design'], unknown>({
    schema,
    action,
    defaultValues: { trialCode, design: design as DesignInput },
    onSaved: () => router.refresh(),
  });
  const { control, formState } = state.form;
  useLeaveWarning(formState.isDirty);
  const [scale, code] = useWatch({ control, name: ['design.scale', 'design.unit'] });
  const unit = offers.units.find((each) => each.code === code)?.text ?? code;
  const workingUnit = scale === 'log' ? `ln ${unit}` : unit;
  return (
    <div className="grid items-start gap-x-10 gap-y-8 min-[68rem]:grid-cols-[minmax(0,1fr)_minmax(24rem,30rem)]">
      <ActionForm
        state={state}
        label="Design"
        className="grid gap-6"
        saved={
          <>
            Saved as the draft.{' '}
            <PageLink href={`/trials/${trialCode}/design`} className="text-water underline">
              Read it and submit it for approval
            </PageLink>
          </>
        }
      >
        <LiveCheck />
        <ResponseSection />
        <DosesSection units={offers.units} fresh={offers.fresh} />
        <RuleSection rules={offers.rules} unit={workingUnit} />
        <GuardrailsSection unit={workingUnit} fresh={offers.fresh} />
        <StoppingSection unit={workingUnit} />
        <CohortsSection />
        <FinalEstimateSection />
        <div className="border-t border-line pt-5">
          <SubmitButton pendingLabel="Saving…">Save the draft</SubmitButton>
        </div>
      </ActionForm>
      <LivePanel control={control} />
    </div>
  );
}

/** Asks before a page with unsaved changes is left. */
function useLeaveWarning(isDirty: boolean) {
  useEffect(() => {
    if (!isDirty) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [isDirty]);
}
