import { comparableRule } from '@/lib/design/comparable-rule';
import { RULE_NAMES, ruleOf } from '@/lib/design/rules/registry';
import type { Design, Doses, RuleName, RuleSettings } from '@/lib/schemas/design';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { CURATED_UNITS } from '@/lib/schemas/units';
import type { OfferedUnit } from './unit-field';

/** A rule as it is offered. */
export interface OfferedRule {
  readonly name: RuleName;
  readonly title: string;
  readonly source: string;
  readonly suits: string;
  /** Settings to begin with. */
  readonly fresh: RuleSettings;
}

/** What a design's groups of settings begin with when they are first chosen. */
export interface FreshSettings {
  readonly levels: Doses;
  readonly range: Doses;
  readonly guardrails: Design['guardrails'];
}

/** What the form offers; made on the server, so that the mathematics is not sent for it. */
export interface DesignFormOffers {
  readonly rules: readonly OfferedRule[];
  readonly units: readonly OfferedUnit[];
  readonly fresh: FreshSettings;
}

/** The rules, units and first settings offered for a design: rules take the same slope for granted as its own. */
export function designFormOffers(design: Design): DesignFormOffers {
  const levels = designDefaults('levels');
  return {
    rules: RULE_NAMES.map((name) => {
      const { title, source, suits } = ruleOf(name).about;
      return { name, title, source, suits, fresh: comparableRule(name, design) };
    }),
    units: CURATED_UNITS,
    fresh: {
      levels: levels.doses,
      range: designDefaults('range').doses,
      guardrails: levels.guardrails,
    },
  };
}
