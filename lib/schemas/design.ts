import { z } from 'zod';
import { checkDesign } from './design-checks';
import { DESIGN_LIMITS, DESIGN_SCHEMA_VERSION } from './design-limits';
import { ruleSchema } from './design-rules';
import { doseSchema } from './dose';
import { numberField, objectError, wholeNumberField } from './number-field';
import { plainText } from './text';
import { unitSchema } from './units';

export { DESIGN_LIMITS, DESIGN_SCHEMA_VERSION } from './design-limits';
export type { RuleName, RuleSettings, SettingsOf } from './design-rules';

const L = DESIGN_LIMITS;

/** How a trial names its response, whether it is a harm, and how its probability runs with dose. */
export const responseSchema = z.strictObject(
  {
    present: plainText('The label of a response', L.labelLength),
    absent: plainText('The label of no response', L.labelLength),
    kind: z.enum(['harm', 'wanted'], {
      error: 'Whether the response is a harm or wanted is not said. Choose harm or wanted.',
    }),
    direction: z.enum(['rising', 'falling'], {
      error: 'How the probability of a response runs with dose is not said. Choose rising or falling.',
    }),
  },
  { error: objectError('The response') },
);

const LEVELS_COUNT = `A trial has ${L.levels.minimum} to ${L.levels.maximum} levels. Enter that many, lowest first.`;

const levelsSchema = z.strictObject(
  {
    kind: z.literal('levels'),
    levels: z
      .array(z.unknown(), { error: `The levels are missing. ${LEVELS_COUNT}` })
      .min(L.levels.minimum, { error: LEVELS_COUNT })
      .max(L.levels.maximum, {
        error: (issue) => `There are ${(issue.input as unknown[]).length} levels. ${LEVELS_COUNT}`,
      })
      .pipe(z.array(doseSchema)),
  },
  { error: objectError('The list of levels') },
);

const rangeSchema = z.strictObject(
  { kind: z.literal('range'), lowest: doseSchema, highest: doseSchema, increment: doseSchema },
  { error: objectError('The range of doses') },
);

/** The doses that may be released: listed levels, or a grid from lowest by increments to at most highest. */
export const dosesSchema = z.discriminatedUnion('kind', [levelsSchema, rangeSchema], {
  error: 'The doses are neither levels nor a range. Choose levels or range.',
});

const largestRiseSchema = z.discriminatedUnion(
  'kind',
  [
    z.strictObject(
      {
        kind: z.literal('step'),
        step: numberField('The largest rise', { above: 0 }, 'Enter a distance on the working scale.'),
      },
      { error: objectError('The largest rise') },
    ),
    z.strictObject(
      {
        kind: z.literal('fold'),
        factor: numberField('The largest fold rise', { above: 1 }, 'Enter a factor such as 2.'),
      },
      { error: objectError('The largest rise') },
    ),
  ],
  { error: 'The largest rise is neither a step nor a fold. Choose step or fold, or none (null).' },
);

const projectionSchema = z.strictObject(
  {
    lowest: numberField('The lower end of the projection', {}, 'Enter it on the working scale.'),
    highest: numberField('The upper end of the projection', {}, 'Enter it on the working scale.'),
  },
  { error: objectError('The projection') },
);

/** When a level closes: P(p > Γ | Beta(a + y, b + n − y)) > cutoff, from a minimum of evaluable subjects. */
export const closingSchema = z.strictObject(
  {
    priorA: numberField(
      'The first parameter of the beta prior',
      L.priorParameter,
      'Enter 1 for a uniform prior.',
    ),
    priorB: numberField(
      'The second parameter of the beta prior',
      L.priorParameter,
      'Enter 1 for a uniform prior.',
    ),
    cutoff: numberField(
      'The cutoff for closing',
      { above: 0, below: 1 },
      'Enter a probability such as 0.95.',
    ),
    minimumEvaluable: wholeNumberField(
      'The number of evaluable subjects before a level can close',
      L.subjects,
      'Enter for example the cohort size.',
    ),
    scope: z.enum(['every-level', 'lowest-level'], {
      error: 'Which levels can close is not said. Choose every-level or lowest-level.',
    }),
  },
  { error: objectError('Closing of levels') },
);

/** Steps 2 to 7 of METHODS: what bounds the dose the rule asks for. */
export const guardrailsSchema = z.strictObject(
  {
    largestRise: largestRiseSchema.nullable(),
    projection: projectionSchema.nullable(),
    ties: z.enum(['lower', 'higher'], { error: 'Where ties go is not said. Choose lower or higher.' }),
    tiesReason: plainText('The reason for sending ties up', L.reasonLength, { lines: true })
      .nullable()
      .default(null),
    noSkipping: z.enum(['tried', 'current', 'off'], {
      error: 'The rule against skipping is not named. Choose tried, current or off.',
    }),
    coherence: z.enum(['off', 'one-way', 'both'], {
      error: 'The coherence rule is not named. Choose off, one-way or both.',
    }),
    closing: closingSchema.nullable(),
  },
  { error: objectError('The guardrails') },
);

const precisionSchema = z.strictObject(
  {
    estimator: z.enum(['last-iterate', 'logit-delta', 'logit-fieller', 'probit-delta', 'probit-fieller'], {
      error:
        'The estimator of the precision rule is not named. Choose last-iterate, logit-delta, logit-fieller, probit-delta or probit-fieller.',
    }),
    level: numberField('The level of the interval', { minimum: 0.5, below: 1 }, 'Enter for example 0.8.'),
    width: numberField('The width to reach', { above: 0 }, 'Enter it on the working scale.'),
    minimumSubjects: wholeNumberField(
      'The number of subjects before precision is judged',
      L.subjects,
      'Enter for example 12.',
    ),
  },
  { error: objectError('The precision rule') },
);

/** Step 8 of METHODS: when the trial stops. */
export const stoppingSchema = z.strictObject(
  {
    maximumSubjects: wholeNumberField(
      'The maximum of subjects',
      L.subjects,
      'Enter a number, or none (null).',
    ).nullable(),
    repeated: z
      .strictObject(
        {
          times: wholeNumberField(
            'How often the same dose is recommended in a row',
            L.repeatedTimes,
            'Enter for example 3.',
          ),
          subjects: wholeNumberField(
            'The evaluable subjects given the repeated dose',
            L.subjects,
            'Enter for example 6.',
          ),
        },
        { error: objectError('The rule of the repeated dose') },
      )
      .nullable(),
    precision: precisionSchema.nullable(),
  },
  { error: objectError('The stopping rules') },
);

const intervalLevel = numberField(
  'The level of the final interval',
  { minimum: 0.5, below: 1 },
  'Enter for example 0.95.',
).default(0.95);
const curveInterval = z
  .enum(['delta', 'fieller'], { error: 'The interval is not named. Choose delta or fieller.' })
  .default('fieller');
const firth = z.boolean({ error: "Say whether Firth's penalty is used: true or false." });
const finalError = { error: objectError('The final estimator') };

/** The estimator of the target dose at the end, fixed beforehand. */
export const finalEstimatorSchema = z.discriminatedUnion(
  'name',
  [
    z.strictObject({ name: z.literal('last-iterate'), intervalLevel }, finalError),
    z.strictObject(
      {
        name: z.literal('polyak-ruppert'),
        burnIn: wholeNumberField(
          'The number of leading values left out of the mean',
          { minimum: 0, maximum: L.cohorts.maximum },
          'Enter 0 to use all.',
        ),
        intervalLevel,
      },
      finalError,
    ),
    z.strictObject({ name: z.literal('isotonic'), intervalLevel }, finalError),
    z.strictObject({ name: z.literal('centred-isotonic'), intervalLevel }, finalError),
    z.strictObject({ name: z.literal('logit'), firth, interval: curveInterval, intervalLevel }, finalError),
    z.strictObject({ name: z.literal('probit'), firth, interval: curveInterval, intervalLevel }, finalError),
  ],
  {
    error:
      'The final estimator is not one of last-iterate, polyak-ruppert, isotonic, centred-isotonic, logit, probit. Choose one of these.',
  },
);

const pendingSchema = z
  .enum(['wait', 'events-count', 'weighted'], {
    error: 'The rule for pending outcomes is not named. Choose wait.',
  })
  .superRefine((pending, context) => {
    if (pending !== 'wait') {
      context.addIssue({
        code: 'custom',
        message: `The rule "${pending}" for pending outcomes is not yet offered. Choose wait: only complete cohorts are used.`,
      });
    }
  });

const designShape = z.strictObject(
  {
    schemaVersion: z.literal(DESIGN_SCHEMA_VERSION, {
      error: `The design is not of version ${DESIGN_SCHEMA_VERSION} of its shape, the only one read here. Enter ${DESIGN_SCHEMA_VERSION}.`,
    }),
    response: responseSchema,
    target: numberField(
      'The target response probability Γ',
      { above: 0, below: 1 },
      'Enter a probability such as 0.25.',
    ),
    doses: dosesSchema,
    unit: unitSchema,
    scale: z.enum(['linear', 'log'], { error: 'The working scale is not named. Choose linear or log.' }),
    doseNotation: z
      .enum(['plain', 'powers-of-ten'], {
        error: 'How doses are printed is not named. Choose plain or powers-of-ten.',
      })
      .default('plain'),
    startingDose: doseSchema,
    cohortSize: wholeNumberField('The cohort size', L.cohortSize, 'Enter for example 3.'),
    maximumCohorts: wholeNumberField('The maximum of cohorts', L.cohorts, 'Enter for example 10.'),
    rule: ruleSchema,
    guardrails: guardrailsSchema,
    evaluableForRise: wholeNumberField(
      'The number of evaluable subjects needed for a rise',
      L.cohortSize,
      'Enter the cohort size, or fewer.',
    ),
    replacements: wholeNumberField(
      'The number of replacements in a cohort',
      L.replacements,
      'Enter 0 for none.',
    ),
    stopping: stoppingSchema,
    pending: pendingSchema,
    finalEstimator: finalEstimatorSchema,
    observationWindow: z.strictObject(
      {
        length: wholeNumberField(
          'The length of the observation window',
          L.windowLength,
          'Enter for example 28.',
        ),
        unit: z.enum(['days', 'hours'], {
          error: 'The unit of the observation window is not named. Choose days or hours.',
        }),
      },
      { error: objectError('The observation window') },
    ),
  },
  { error: objectError('The design') },
);

/**
 * A trial's design: everything a recommendation is computed from besides the data. One schema for form, action,
 * API, import and the mathematics. Every refusal names the field by its path and says what holds and what to do.
 */
export const designSchema = designShape.superRefine(checkDesign);

/** A validated design. */
export type Design = z.output<typeof designShape>;
/** A design as typed or posted, before defaults are filled in. */
export type DesignInput = z.input<typeof designShape>;
export type Doses = Design['doses'];
export type Guardrails = Design['guardrails'];
export type FinalEstimator = Design['finalEstimator'];
export type PrecisionRule = NonNullable<Design['stopping']['precision']>;
