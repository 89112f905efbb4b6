export { curveSlopeFromLogit, robbinsMonroAsymptotics, type Asymptotics } from './asymptotics';
export {
  BinaryRegression,
  linkFunction,
  linkInverse,
  type FitMethod,
  type FitOutcome,
  type Link,
} from './binary-regression';
export {
  BOOTSTRAP_DRAWS,
  BOOTSTRAP_SEED,
  bootstrapInterval,
  sampleQuantile,
  type BootstrapInterval,
} from './bootstrap';
export { estimateTarget } from './estimate';
export { closingBoundary, CUTOFF_GUARD, exceedanceProbability, exceedsCutoff } from './exceedance';
export { existenceStatus, type ExistenceStatus } from './existence';
export { fitBinary, type BinaryFit, type FitResult } from './fit';
export {
  centredIsotonicFit,
  isotonicEstimate,
  isotonicFit,
  isotonicQuantile,
  type IsotonicQuantile,
} from './isotonic';
export { fitLogistic, logisticRegression } from './logistic';
export { averagedIterates, type AveragedIterates } from './polyak-ruppert';
export { precisionEstimator, precisionReached, type PrecisionVerdict } from './precision';
export { fitProbit, probitRegression } from './probit';
export {
  clopperPearsonInterval,
  jeffreysInterval,
  proportionInterval,
  proportionMethods,
  wilsonInterval,
  type ProportionInterval,
  type ProportionMethod,
} from './proportion';
export {
  fiellerSet,
  quantileEstimate,
  SMALLEST_SLOPE,
  type FiellerSet,
  type QuantileEstimate,
} from './quantile';
export { groupRows, mirrorRows, type DoseRow } from './rows';
export * from './target-estimate';
