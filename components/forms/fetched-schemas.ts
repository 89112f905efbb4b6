import type { InstallationInputSchemas } from '@/lib/schemas/installation-inputs';
import type { TrialFormSchemas } from '@/lib/schemas/trial-forms';

/** The schema of a form of a trial, fetched when the form is first used: `schema: trialSchema('record-outcome')`. */
export function trialSchema<Type extends keyof TrialFormSchemas>(
  type: Type,
): () => Promise<TrialFormSchemas[Type]> {
  return () => import('@/lib/schemas/trial-forms').then((module) => module.trialFormSchemas[type]);
}

/** The schema of a form of the administration, fetched when the form is first used. */
export function installationSchema<Type extends keyof InstallationInputSchemas>(
  type: Type,
): () => Promise<InstallationInputSchemas[Type]> {
  return () =>
    import('@/lib/schemas/installation-inputs').then((module) => module.installationInputSchemas[type]);
}
