/** Limits of a design, shared by schema, model and page. */
export const DESIGN_LIMITS = {
  labelLength: 60,
  reasonLength: 1000,
  levels: { minimum: 2, maximum: 50 },
  gridDoses: { minimum: 2, maximum: 10_000 },
  cohortSize: { minimum: 1, maximum: 50 },
  cohorts: { minimum: 1, maximum: 200 },
  replacements: { minimum: 0, maximum: 50 },
  subjects: { minimum: 1, maximum: 10_000 },
  repeatedTimes: { minimum: 2, maximum: 200 },
  windowLength: { minimum: 1, maximum: 400 },
  /** Versions of one trial's design. */
  versions: 1000,
  priorParameter: { above: 0, maximum: 1000 },
} as const;

/** The version of the design's shape that is written now. */
export const DESIGN_SCHEMA_VERSION = 1;
