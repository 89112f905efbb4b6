import type { RuleName } from '@/lib/schemas/design';
import { adaptiveSlope } from './adaptive-slope';
import { joseph } from './joseph';
import { kesten } from './kesten';
import { logitMl } from './logit-ml';
import { robbinsMonro } from './robbins-monro';
import type { AnyRule, Rule } from './rule';
import { virtualObservations } from './virtual-observations';

/** All rules by name, in the order they are offered. A further rule is one file, one line here and its tests. */
export const RULES: { readonly [Name in RuleName]: Rule<Name> } = {
  'robbins-monro': robbinsMonro,
  kesten,
  joseph,
  'virtual-observations': virtualObservations,
  'adaptive-slope': adaptiveSlope,
  'logit-ml': logitMl,
};

export const RULE_NAMES = Object.keys(RULES) as RuleName[];

/** The rule of a name. The schema's discriminated union pairs it with settings of its own. */
export function ruleOf(name: RuleName): AnyRule {
  return RULES[name] as AnyRule;
}
