import type { Design, RuleName, RuleSettings } from '@/lib/schemas/design';
import { workingUnit } from './working-unit';

/** A term and what holds for it. */
export interface WordsItem {
  readonly term: string;
  readonly detail: string;
}

/** How each rule goes from one cohort to the next (METHODS, rules 1 to 6). */
export const RULE_FORMULAS: Readonly<Record<RuleName, string>> = {
  'robbins-monro': 'x_[k+1] = x_[k] − a_[k](ȳ_[k] − Γ), a_[k] = c/(k + k_[0])^[γ]',
  kesten:
    'x_[k+1] = x_[k] − a_[κ](ȳ_[k] − Γ), a_[κ] = c/(κ + k_[0])^[γ]; κ rises only when ȳ − Γ changes its sign',
  joseph: 'x_[k+1] = x_[k] − a_[k](ȳ_[k] − b_[k]); a_[k] and b_[k] follow from β_[P] and τ_[k]',
  'virtual-observations':
    'x_[k+1] = mean of the doses given − (mean of ȳ_[1]…ȳ_[k] − Γ)/b, on the working scale',
  'adaptive-slope': 'x_[k+1] = x_[k] − (ȳ_[k] − Γ)/(k b̂_[k]), b̂_[k] the least-squares slope so far',
  'logit-ml': 'x_[k+1] = (logit Γ − α̂)/β̂_[L], from a logit fitted to all subjects',
};

const ADAPTIVE_MEAN = 'x_[k+1] = mean of the doses given − (mean of ȳ_[1]…ȳ_[k] − Γ)/b̂_[k]';

/** The formula of a rule with its settings. */
export function ruleFormula(rule: RuleSettings): string {
  return rule.name === 'adaptive-slope' && rule.form === 'mean' ? ADAPTIVE_MEAN : RULE_FORMULAS[rule.name];
}

function carryItems(rule: Extract<RuleSettings, { carry: string }>): WordsItem[] {
  return rule.carry === 'iterate'
    ? [{ term: 'Carries on from', detail: 'the value it assigned, before rounding to a dose' }]
    : [
        { term: 'Carries on from', detail: 'the mean dose really given' },
        ...(rule.carryReason ? [{ term: 'Reason', detail: rule.carryReason }] : []),
      ];
}

/** The settings of a rule in words, with their units. */
export function ruleItems(rule: RuleSettings, design: Pick<Design, 'scale' | 'unit'>): WordsItem[] {
  const unit = workingUnit(design);
  const slope = (value: number) => `${value} per ${unit}`;
  switch (rule.name) {
    case 'robbins-monro':
    case 'kesten':
      return [
        { term: 'Gain constant c', detail: `${rule.c} ${unit}` },
        { term: 'Gain offset k0', detail: String(rule.k0) },
        { term: 'Gain exponent γ', detail: String(rule.gamma) },
        ...carryItems(rule),
      ];
    case 'joseph':
      return [
        { term: 'Probit slope', detail: slope(rule.slope) },
        { term: 'Prior standard deviation τ₁', detail: `${rule.priorSd} ${unit}` },
      ];
    case 'virtual-observations':
      return [
        { term: 'Assumed slope b', detail: slope(rule.slope) },
        {
          term: 'Bounds of the carried value',
          detail: rule.carryBounds
            ? `${rule.carryBounds.lowest} to ${rule.carryBounds.highest} ${unit}`
            : 'none',
        },
      ];
    case 'adaptive-slope':
      return [
        {
          term: 'Form',
          detail: rule.form === 'last' ? 'from the last value' : 'from the means of all cohorts',
        },
        { term: 'Slope until one can be fitted', detail: slope(rule.initialSlope) },
        { term: 'Slope kept within', detail: `${rule.slopeLow} to ${slope(rule.slopeHigh)}` },
        {
          term: 'Cohorts',
          detail: rule.weighted ? 'weighted by their evaluable subjects' : 'count alike whatever their size',
        },
        ...(rule.form === 'last' ? carryItems(rule) : []),
      ];
    case 'logit-ml':
      return [
        {
          term: 'Where no finite maximum exists',
          detail: rule.firth ? 'Firth’s penalty' : 'the fallback step',
        },
        { term: 'Fallback step', detail: `c/k with c = ${rule.c} ${unit}` },
        { term: 'Largest move', detail: `${rule.largestMove} ${unit} from the mean dose given` },
      ];
  }
}
