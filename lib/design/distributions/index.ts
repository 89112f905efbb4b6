export { betaCdf, betaDensity, betaQuantile, betaSurvival } from './beta';
export { binomialCdf, binomialProbability, binomialSurvival } from './binomial';
export { gaussLegendreRule, integrate } from './gauss-legendre';
export { logGamma } from './log-gamma';
export { expit, logit, logOnePlusExp } from './logistic';
export { inverseMillsRatio, logNormalCdf, normalCdf, normalDensity, normalQuantile } from './normal';
export { bivariateNormalEqual, owensT } from './owens-t';
