import { z } from 'zod';
import { DESIGN_LIMITS } from './design-limits';
import { numberField, objectError } from './number-field';
import { plainText } from './text';

const GAMMA_REASON =
  'It must be above 0.5 and at most 1, because only then do the gains c/(k + k0)^γ sum to infinity (Σa_k = ∞) while their squares do not (Σa_k² < ∞). Enter a number such as 1.';

const gainConstant = numberField(
  'The gain constant c',
  { above: 0 },
  'Enter it in units of the working scale per unit of probability.',
);

const gain = {
  c: gainConstant,
  k0: numberField('The gain offset k0', { minimum: 0 }, 'Enter 0 for no offset.'),
  gamma: z
    .number({ error: `The gain exponent γ is missing or not a number. ${GAMMA_REASON}` })
    .gt(0.5, { error: (issue) => `The gain exponent γ is ${String(issue.input)}. ${GAMMA_REASON}` })
    .lte(1, { error: (issue) => `The gain exponent γ is ${String(issue.input)}. ${GAMMA_REASON}` }),
};

const carry = {
  carry: z.enum(['iterate', 'given'], {
    error:
      'What the rule carries on from is not named. Choose the assigned value (iterate) or the dose given.',
  }),
  carryReason: plainText('The reason for carrying the dose given', DESIGN_LIMITS.reasonLength, {
    lines: true,
  })
    .nullable()
    .default(null),
};

function slope(name: string) {
  return numberField(
    name,
    { above: 0 },
    'Enter a slope on the working scale, positive in the direction of response.',
  );
}

/** Robbins & Monro 1951: x_{k+1} = f_k − a_k e_k. */
export const robbinsMonroSchema = z.strictObject(
  { name: z.literal('robbins-monro'), ...gain, ...carry },
  { error: objectError('The Robbins–Monro rule') },
);

/** Kesten 1958: the gain's index moves on only when the sign of e changes. */
export const kestenSchema = z.strictObject(
  { name: z.literal('kesten'), ...gain, ...carry },
  { error: objectError("Kesten's rule") },
);

/** Joseph 2004: gains from a normal prior on the distance of the start from the target dose. */
export const josephSchema = z.strictObject(
  {
    name: z.literal('joseph'),
    slope: slope('The probit slope β_P'),
    priorSd: numberField(
      'The prior standard deviation τ₁',
      { above: 0 },
      'Enter how far the starting value may be from the target dose, on the working scale.',
    ),
  },
  { error: objectError("Joseph's rule") },
);

const carryBounds = z
  .strictObject(
    {
      lowest: numberField('The lowest carried value', {}, 'Enter it on the working scale.'),
      highest: numberField('The highest carried value', {}, 'Enter it on the working scale.'),
    },
    { error: objectError('The bounds of the carried value') },
  )
  .refine((bounds) => bounds.lowest < bounds.highest, {
    path: ['highest'],
    error: 'The highest carried value is not above the lowest. Enter the lower bound first.',
  });

/** Cheung & Elkind 2010: virtual observations, with an assumed slope b. */
export const virtualObservationsSchema = z.strictObject(
  {
    name: z.literal('virtual-observations'),
    slope: slope('The assumed slope b'),
    carryBounds: carryBounds.nullable().default(null),
  },
  { error: objectError('The rule of virtual observations') },
);

/** Lai & Robbins 1979, Anbar 1978: the least-squares slope so far, truncated. */
export const adaptiveSlopeSchema = z.strictObject(
  {
    name: z.literal('adaptive-slope'),
    form: z.enum(['last', 'mean'], {
      error: 'The form of the adaptive slope is not named. Choose the last value (last) or the means (mean).',
    }),
    initialSlope: slope('The slope used until one can be fitted'),
    slopeLow: slope('The smallest slope'),
    slopeHigh: slope('The largest slope'),
    weighted: z.boolean({ error: 'Say whether cohorts are weighted by their size: true or false.' }),
    ...carry,
  },
  { error: objectError('The adaptive-slope rule') },
);

/** Wu 1985: the target quantile of a fitted logit, with Firth's penalty where no finite maximum exists. */
export const logitMlSchema = z.strictObject(
  {
    name: z.literal('logit-ml'),
    firth: z.boolean({ error: "Say whether Firth's penalty stands in where no fit exists: true or false." }),
    c: gainConstant,
    largestMove: numberField(
      'The largest move',
      { above: 0 },
      'Enter the largest distance of the next value from the mean dose given, on the working scale.',
    ),
  },
  { error: objectError('The logit rule') },
);

/** The rule that moves the dose, step 1 of METHODS, by its name. */
export const ruleSchema = z.discriminatedUnion(
  'name',
  [
    robbinsMonroSchema,
    kestenSchema,
    josephSchema,
    virtualObservationsSchema,
    adaptiveSlopeSchema,
    logitMlSchema,
  ],
  {
    error:
      'The rule is not one of robbins-monro, kesten, joseph, virtual-observations, adaptive-slope, logit-ml. Choose one of these.',
  },
);

/** A rule with its settings. */
export type RuleSettings = z.output<typeof ruleSchema>;
export type RuleName = RuleSettings['name'];
/** The settings of the rule of one name. */
export type SettingsOf<Name extends RuleName> = Extract<RuleSettings, { name: Name }>;
