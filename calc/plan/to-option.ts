import { voltsAtSoc } from '../curve/ocv';
import { quantile } from '../statistics/quantile';
import type { Band, PlanOption, PlannedStep } from '../plan-types';
import { optionCautions } from './option-cautions';
import { layOut, toSegments, type Clock, type ClockInput } from './clock';
import { dominantDoubt } from './doubt-shares';
import type { Draft, DraftStep } from './draft';
import { minimumRestS } from './minimum-rest';
import type { PlanModel } from './plan-model';
import { timeFactorOf, timeFactorText, withTimeFactor } from './time-factor';
import { toTrace } from './to-trace';
import { ampsText } from './words';

/** When a draft is ready, with its band, and where its groups end: all that a list of many spares asks. */
export function optionTotals(model: PlanModel, draft: Draft) {
  const { input } = model;
  const { steps } = draft;
  const endSoc = steps.length === 0 ? model.startSoc : steps[steps.length - 1]!.socAfter;
  const endGroupVolts = endSoc.map((soc) => voltsAtSoc(model.curve, soc));
  const clockInput: ClockInput = {
    steps,
    workshop: input.workshop,
    busbarsOff: draft.busbarsOff,
    clipOnAtS: input.clipOnAtS,
    restS: minimumRestS(model, endSoc),
    seconds: steps.map((step) => step.seconds),
  };
  clockInput.restS = Math.max(clockInput.restS, settleAfterEnd(steps, layOut(clockInput)));
  const clock = layOut(clockInput);
  const reckoned = model.samples().map((sample) => steps.map((step) => step.secondsIn(sample)));
  const factor = timeFactorOf(input, steps);
  const sampled = factor === null ? reckoned : withTimeFactor(reckoned, factor);
  const ready = sampled.map((seconds) => layOut({ ...clockInput, seconds }).readyS);
  const totalS: Band = { p10: quantile(ready, 0.1), p50: quantile(ready, 0.5), p90: quantile(ready, 0.9) };
  return { clockInput, clock, factor, sampled, ready, totalS, endGroupVolts, ...endsOf(model, endGroupVolts) };
}

/** How far apart the groups end, and whether each is inside the tolerance. */
function endsOf(model: PlanModel, endGroupVolts: number[]) {
  return {
    endSpreadVolts: Math.max(...endGroupVolts) - Math.min(...endGroupVolts),
    withinTolerance: endGroupVolts.every((volts) => Math.abs(volts - model.targetVolts) <= model.toleranceVolts + 1e-5),
  };
}

/** Puts a draft on the clock and gives it its band. */
export function toOption(model: PlanModel, draft: Draft): PlanOption {
  const { input } = model;
  const { steps } = draft;
  const totals = optionTotals(model, draft);
  const { clockInput, clock, factor, sampled, totalS, endGroupVolts, endSpreadVolts, withinTolerance } = totals;
  const doubt = dominantDoubt(model.samples(), totals.ready);
  const likely = likelyInput(clockInput, clock, totalS.p50);

  const latestStartS = input.readyByS === null ? null : input.readyByS - (totalS.p90 - clock.queueS);
  const option: PlanOption = {
    id: optionId(draft),
    way: draft.way,
    finish: draft.finish,
    direction: draft.direction,
    channelIds: channelIdsOf(draft),
    channelText: channelText(model, draft),
    amps: draft.amps,
    steps: steps.map((step, at) => toPlannedStep(model, step, clock, at)),
    totalS,
    queueS: clock.queueS,
    currentStartS: clock.currentStartS,
    currentEndS: clock.currentEndS,
    segments: toSegments(likely, layOut(likely)),
    trace: toTrace(model, steps, clock, currentSpread(steps, sampled)),
    ampHours: moduleAmpHours(steps),
    wattHours: steps.reduce((sum, step) => sum + (step.kind === 'pre-level' ? 0 : step.wattHours), 0),
    handsOnS: clock.handsOnS,
    busbarsOff: draft.busbarsOff,
    takes: draft.takes,
    endSpreadVolts,
    endGroupVolts,
    withinTolerance,
    setVolts: draft.setVolts,
    setVoltsCap: draft.setVoltsCap,
    restS: clockInput.restS,
    latestStartS,
    tooLate: latestStartS !== null && latestStartS < input.clipOnAtS + clock.queueS,
    soonest: false,
    soonestBusbarsStay: false,
    dominant: doubt.dominant,
    narrowsByS: doubt.narrowsByS,
    cautions: [],
    ...knownEndOf(model, draft),
    ...(factor === null ? {} : { timeFactor: factor, timeFactorText: timeFactorText(factor) }),
  };
  option.cautions = optionCautions(model, draft, option);
  return option;
}

/** In the order in which they are clipped on. */
export const channelIdsOf = ({ steps }: Draft): string[] => [
  ...new Set(steps.flatMap((step) => (step.channel ? [step.channel.channelId] : []))),
];

function knownEndOf(model: PlanModel, { knownEnd, endSocIn }: Draft): Pick<PlanOption, 'knownEnd' | 'endSoc'> {
  if (knownEnd === undefined || endSocIn === undefined) return {};
  const ends = model.samples().map(endSocIn);
  return {
    knownEnd,
    endSoc: { p10: quantile(ends, 0.1), p50: quantile(ends, 0.5), p90: quantile(ends, 0.9) },
  };
}

/** What the over-voltages left in the groups want of rest after the last current, s. */
function settleAfterEnd(steps: DraftStep[], clock: Clock): number {
  return steps.reduce((longest, step, at) => Math.max(longest, clock.stopS[at]! + step.settleS - clock.currentEndS), 0);
}

/** The likely run, stretched so that it is ready at the middle of the band. */
function likelyInput(input: ClockInput, clock: Clock, p50: number): ClockInput {
  const currentS = clock.currentEndS - clock.currentStartS;
  const gapsS =
    currentS -
    Math.min(
      currentS,
      input.seconds.reduce((sum, seconds) => sum + seconds, 0),
    );
  const flowing = currentS - gapsS;
  if (!(flowing > 0)) return input;
  const stretch = Math.max(0, 1 + (p50 - clock.readyS) / flowing);
  return { ...input, seconds: input.seconds.map((seconds) => seconds * stretch) };
}

/** Shortest and longest current over the nominal one, at 10 and 90 % of the samples. */
function currentSpread(steps: DraftStep[], sampled: number[][]): { shortest: number; longest: number } {
  const nominal = steps.reduce((sum, step) => sum + step.seconds, 0);
  if (!(nominal > 0)) return { shortest: 1, longest: 1 };
  const ratios = sampled.map((seconds) => seconds.reduce((sum, value) => sum + value, 0) / nominal);
  return { shortest: quantile(ratios, 0.1), longest: quantile(ratios, 0.9) };
}

function toPlannedStep(model: PlanModel, step: DraftStep, clock: Clock, at: number): PlannedStep {
  return {
    kind: step.kind,
    way: step.way,
    channelIds: step.channel ? [step.channel.channelId] : [],
    resistorId: step.resistorId,
    groupIndexes: step.groupIndexes,
    direction: step.direction,
    startS: clock.startS[at]!,
    stopS: clock.stopS[at]!,
    setVolts: step.setVolts,
    setAmps: step.setAmps,
    ampHours: step.ampHours,
    wattHours: step.wattHours,
    endAmps: step.endAmps,
    ...(step.precharge ? { precharge: true as const } : {}),
    voltageLimitAtS: step.voltageLimitAtS === null ? null : clock.startS[at]! + step.voltageLimitAtS,
    restVoltsAfter: step.socAfter.map((soc) => voltsAtSoc(model.curve, soc)),
  };
}

/** What levelling passes from group to group is not brought in. */
const moduleAmpHours = (steps: DraftStep[]): number =>
  steps.reduce((sum, step) => sum + (step.kind === 'pre-level' ? 0 : step.ampHours), 0);

function optionId({ way, finish, steps, knownEnd }: Draft): string {
  const bulk = steps.filter((step) => step.kind === 'bulk');
  const channels = [...new Set(bulk.map((step) => step.channel?.channelId ?? step.resistorId ?? ''))];
  const from = knownEnd === undefined ? '' : `/from-${knownEnd}`;
  return `${way}/${finish}/${channels.length === 1 ? channels[0] : 'several'}${from}`;
}

function channelText(model: PlanModel, draft: Draft): string {
  const bulk = draft.steps.filter((step) => step.kind === 'bulk');
  const names = [...new Set(bulk.flatMap((step) => (step.channel ? [step.channel.name] : [])))];
  const trims = draft.steps.flatMap((step) => (step.kind === 'trim' && step.channel ? [step.channel.name] : []));
  const then = [...new Set(trims)].filter((name) => !names.includes(name));
  const resistor = model.input.resistors.find((one) => one.resistorId === bulk[0]?.resistorId);
  const head = names.length > 0 ? names.join(' + ') : (resistor?.name ?? '');
  return `${head} · ${ampsText(draft.amps)}${then.length > 0 ? `, then ${then.join(' + ')}` : ''}`;
}
