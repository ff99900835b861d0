export * from './types';
export * from './plan-types';
export * from './live-types';
export * from './bench/bench-types';
export { CalcInputError } from './errors';
export { isBeyondCurve, shiftCurve, slopeAtSoc, socAtVolts, voltsAtSoc } from './curve/ocv';
export { chargeThroughTerminals } from './charge-through-terminals';
export { chargeGroupByGroup } from './charge-group-by-group';
export { chargeParalleled, joinGroups } from './charge-paralleled';
export { equaliseThroughResistor } from './equalise-through-resistor';
export { joiningInrush, type JoiningInrush } from './joining-inrush';
export { setVoltageCap, type SetVoltageCap } from './set-voltage-cap';
export { chemistryParameters, guessedLongResistance } from './chemistry';
export { CHEMISTRIES, type ChemistryParameters } from './parameters/chemistries';
export { PUBLISHED_CURVES, publishedCurves, type PublishedCurve } from './parameters/published-curves';
export { checkOwnCurve, type CurveProblem, type OwnCurve } from './curve/own-curve';
export { longResistance, splitLongResistance } from './resistance/long-resistance';
export { pulseTimeConstant, type PulseResistance } from './resistance/pulse-time-constant';
export { resistanceTemperatureFactor } from './resistance/temperature-factor';
export { temperatureVolts } from './parameters/temperature-coefficient';
export { quantile, quantileOfSorted } from './statistics/quantile';
export { seededRandom } from './statistics/seeded-random';
export { latinHypercube, latinHypercubeNormal, shuffled } from './statistics/latin-hypercube';
export { inverseNormal } from './statistics/inverse-normal';
export { normalCdf } from './statistics/normal-cdf';
export { predictRest, type RestForecast, type RestOptions, type RestReading } from './rest/predict-rest';
export { combineFigures, type CombinedFigure, type Figure } from './learn/figure';
export {
  capacityFromTwoReadings,
  type GroupCapacity,
  type TwoReadings,
  type TwoReadingsCapacity,
} from './learn/two-readings';
export {
  resistanceFromReadings,
  type ResistanceFound,
  type ResistanceReadings,
} from './learn/resistance-from-readings';
export { learnedFactor, type ClosedCharge, type LearnedFactor } from './learn/learned-factor';

// The planner and the running charge.
export { planCharge, type OnlyWay } from './plan/plan-charge';
export { soonestTerminals, type SoonestTerminals } from './plan/soonest-terminals';
export { withTimeFactor } from './plan/time-factor';
export { judgeCheck } from './plan/judge-check';
export { reckonCharge } from './live/reckon-charge';
export {
  startThinning,
  STORED_THINNING,
  thinForStoring,
  widerThinning,
  type StoredPoint,
  type Thinning,
  type ThinningRule,
} from './live/stored-thinning';
export { quickEstimate, type QuickEstimate, type QuickNumbers, type QuickWay } from './plan/estimate';

// The pack: its readings, what they say, and what balancing will do.
export { oddGroups, type GroupVolts, type OddGroups, type OddGroupsOptions } from './pack/odd-groups';
export { packTarget, type PackTarget, type PackTargetInput } from './pack/pack-target';
export { type TargetReason, type TargetTrust } from './pack/target-trust';
export { readingAmpHours, type ReadingAmpHours, type ReadingAmpHoursInput } from './pack/reading-amp-hours';
export { spareAgreement, type Agreement, type SpareAgreement, type SpareAgreementInput } from './pack/spare-agreement';
export { bleedHours, type BleedHoursInput } from './pack/bleed-hours';
export { type Likely, type PackReading, type PackStage } from './pack/pack-reading';
export { classifyChange, type ChangeKind, type ChangeOptions, type PackChange } from './pack/classify-change';
export { balanceForecast, type BalanceForecast, type BalanceForecastOptions } from './pack/balance-forecast';
export { type BalanceSource } from './pack/balance-rate';
export { type DoesNotConverge } from './pack/convergence';
export {
  compareSources,
  type ComparedGroup,
  type CompareSourcesInput,
  type SourceComparison,
} from './pack/compare-sources';

// The bench plan: channels, other work, look-ins.
export { planBench, earliestDueFirst } from './bench/plan-bench';
export { planFills } from './bench/plan-fills';
export { assignLookIns } from './bench/assign-look-ins';
export { intersect, merge, subtract } from './bench/stretches';

// Waits: the simulator, the replay of what happened, and what the figures say.
export * from './waits/waits-types';
export { simulateQueue } from './waits/simulate-queue';
export { replayCharges } from './waits/replay-charges';
export { channelsNeeded, type ChannelsNeeded } from './waits/channels-needed';
export { erlangC, erlangChannels } from './waits/erlang-c';
export { openBetween } from './waits/open-time';
export { runMinutes, type RunInput } from './waits/run-minutes';
export { shelfVolts, type ShelfInput, type ShelfVoltage } from './waits/shelf-volts';
export {
  FEWEST_AVERAGED,
  mannWhitney,
  medianDifference,
  plannedAgainstActual,
  type PlannedActual,
} from './waits/compare-periods';
