import type { Design, RuleName, RuleSettings } from '@/lib/schemas/design';
import { curveSlopeFrom } from './advice/believed-curve';
import { normalDensity, normalQuantile } from './distributions/normal';
import { doseSetOf } from './dose-set';

/** Three significant digits: a setting to be read and changed by a person. */
function rounded(value: number): number {
  return Number(value.toPrecision(3));
}

/**
 * The slope D at the target dose a rule's settings take for granted, probability per working-scale unit: 1/c where c is the
 * gain, since the best gain is 1/D; the assumed slope itself for virtual observations and the adaptive slope;
 * β_P φ(Φ⁻¹(Γ)) for Joseph's rule.
 */
export function impliedSlope(rule: RuleSettings, target: number): number {
  switch (rule.name) {
    case 'robbins-monro':
    case 'kesten':
    case 'logit-ml':
      return 1 / rule.c;
    case 'joseph':
      return curveSlopeFrom('probit', rule.slope, target);
    case 'virtual-observations':
      return rule.slope;
    case 'adaptive-slope':
      return rule.initialSlope;
  }
}

/**
 * Settings of another rule that take the same slope D for granted as the design's own: gains 1/D without offset and with
 * γ = 1, β_P = D/φ(Φ⁻¹(Γ)), b = D, an adaptive slope that begins at D and may be four times smaller or larger. Joseph's τ_1 and
 * the logit rule's largest move are half the width of the doses on the working scale. Rounded to three digits. A starting
 * point for a comparison or a form, to be changed by a person; no source, a choice of this software.
 *
 * @param name the rule wanted; the design's own comes back as it stands. @param design a validated design.
 */
export function comparableRule(name: RuleName, design: Design): RuleSettings {
  const { rule, target } = design;
  if (rule.name === name) return rule;
  const slope = impliedSlope(rule, target);
  const doses = doseSetOf(design.doses, design.scale);
  const halfWidth = rounded((doses.working(doses.count - 1) - doses.working(0)) / 2);
  const gain = rounded(1 / slope);
  switch (name) {
    case 'robbins-monro':
    case 'kesten':
      return { name, c: gain, k0: 0, gamma: 1, carry: 'iterate', carryReason: null };
    case 'joseph':
      return {
        name,
        slope: rounded(slope / normalDensity(normalQuantile(target))),
        priorSd: halfWidth,
      };
    case 'virtual-observations':
      return { name, slope: rounded(slope), carryBounds: null };
    case 'adaptive-slope':
      return {
        name,
        form: 'last',
        initialSlope: rounded(slope),
        slopeLow: rounded(slope / 4),
        slopeHigh: rounded(slope * 4),
        weighted: false,
        carry: 'iterate',
        carryReason: null,
      };
    case 'logit-ml':
      return { name, firth: true, c: gain, largestMove: halfWidth };
  }
}

/**
 * The design with another rule of {@link comparableRule}, all else as it stands. A precision rule on the last value, which only
 * Robbins & Monro's rule has an interval for, is left out under another rule.
 */
export function comparableDesign(name: RuleName, design: Design): Design {
  const rule = comparableRule(name, design);
  const keepsPrecision = name === design.rule.name || design.stopping.precision?.estimator !== 'last-iterate';
  return {
    ...design,
    rule,
    stopping: keepsPrecision ? design.stopping : { ...design.stopping, precision: null },
  };
}
