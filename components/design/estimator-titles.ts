import type { FinalEstimator } from '@/lib/schemas/design';

/** How each final estimator is called. */
export const ESTIMATOR_TITLES: Readonly<Record<FinalEstimator['name'], string>> = {
  'last-iterate': 'Last value of the rule',
  'polyak-ruppert': 'Mean of the rule’s values (Polyak–Ruppert)',
  isotonic: 'Isotonic regression',
  'centred-isotonic': 'Centred isotonic regression',
  logit: 'Logit fit',
  probit: 'Probit fit',
};
