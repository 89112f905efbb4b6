export {
  curveSlopeFrom,
  curveThroughPoints,
  curveThroughTarget,
  doseAtProbability,
  responseProbability,
  slopesAtTarget,
  slopesFromCurve,
  type BelievedCurve,
  type BelievedPoint,
  type BeliefFailure,
  type TargetSlopes,
} from './believed-curve';
export {
  adviceTexts,
  adviseDesign,
  isExtremeTarget,
  type AdviceNote,
  type Belief,
  type DesignAdvice,
} from './design-advice';
export {
  assessGain,
  gainAt,
  linearisedError,
  longRunGain,
  type GainAssessment,
  type GainSequence,
} from './gain';
export {
  givenFreeze,
  movement,
  runAhead,
  stepAdvice,
  type GivenFreeze,
  type Movement,
  type RunAhead,
  type StepAdvice,
} from './movement';
export { settlingLevels, type SettlingLevel } from './settling';
