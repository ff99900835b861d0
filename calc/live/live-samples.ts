import type { PlannedStep, PlanOption } from '../plan-types';
import { ampsWidening } from '../plan/charger-amps';
import { leadOhmIn } from '../plan/leads';
import type { PlanModel } from '../plan/plan-model';
import { leadOhmOf } from './live-draws';
import type { LiveModel } from './live-model';
import { chargerSd, sampleRun, type SampleRun } from '../plan/sample-run';
import { SAMPLE_AXES, type Sample } from '../plan/samples';
import { sampleString } from '../plan/series-step';
import { stringCharge } from '../plan/string-charge';
import type { Drive } from './lane';
import { meanSetAmps, plannedSource } from './planned-source';

/** Standard deviations between 10 and 90 % of a normal distribution. */
const NORMAL_80 = 2.563;
/** A current that was read is the set one within this. */
const SET_SHARE = 0.05;
const CAPACITY_AXIS = SAMPLE_AXES.indexOf('capacity');

/** Charge that has gone into a group in a sample, Ah at its terminals; out of it: negative. */
export type MovedIn = (sample: Sample, group: number) => number;

/**
 * One planned step in the samples, from where earlier charge has left the groups: the same quadrature as the plan's.
 *
 * @param drive what readings have shown of the source; in a taper it makes every sample begin with the amps that flow
 * @param ampsNow those amps
 */
export function liveSampleRun(
  model: LiveModel,
  option: PlanOption,
  step: PlannedStep,
  movedIn: MovedIn,
  drive: Drive,
  ampsNow = 0,
): SampleRun {
  const channel = model.input.channels.find((one) => one.channelId === step.channelIds[0]);
  if (!channel) return resistorRun(model, option, step);
  const sign = step.direction === 'charge' ? 1 : -1;
  const joined = step.way === 'paralleled';
  const count = joined ? 1 : step.groupIndexes.length;
  const linkOhm = step.way === 'terminals' ? model.input.module.linkResistanceOhm : 0;
  const stringIn = joined
    ? joinedString(model, step, movedIn)
    : sampleString(model, step.groupIndexes, step.direction, movedIn);
  const endVolts = joined
    ? step.restVoltsAfter[step.groupIndexes[0]!]!
    : step.groupIndexes.reduce((sum, group) => sum + step.restVoltsAfter[group]!, 0);
  const setVolts = step.setVolts === null ? null : step.setVolts + drive.setShiftVolts;
  const source = plannedSource(model, step, channel);
  const unread = model.weights === null;
  const asPlanned = leadOhmIn(channel);
  // The current that ends a taper is the plan's, whatever has been learned since.
  const ohm = source.leadResistanceOhm + linkOhm + stringIn(model.planned).ohm;
  const knownEnd = option.knownEnd === undefined ? null : option.knownEnd === 'full' ? 'charge' : 'discharge';
  const toEnd = knownEnd === step.direction;
  const onTheMark = isOnTheMark(model, option, step, count, endVolts);
  const run = sampleRun({
    model,
    source: { ...source, setVolts, maxAmps: asSetAmps(meanSetAmps(step, channel), drive) ?? source.maxAmps },
    sign,
    count,
    linkOhm,
    chargerSd: chargerSd(model, channel, count),
    // The plan's own samples have the leads as the plan has them, those of a charge that was read as its readings do.
    leadOhmIn: (sample) => {
      if (channel.senses === 'module') return 0;
      return unread ? (asPlanned?.(sample) ?? source.leadResistanceOhm) : leadOhmOf(channel, sample);
    },
    currentWidening: unread ? ampsWidening(channel, source.maxAmps, model.spreads.currentRelative) : 1,
    startAmps: drive.seenInTaper && ampsNow > 0 ? ampsNow : null,
    aimVolts: toEnd && setVolts !== null ? setVolts : endVolts,
    first:
      step.way === 'terminals' &&
      step.precharge !== true &&
      knownEnd === null &&
      step.restVoltsAfter.some((volts) => Math.abs(volts - model.targetVolts) > model.toleranceVolts + 1e-5),
    endAmps: toEnd
      ? Math.abs(step.endAmps)
      : onTheMark && step.setVolts !== null
        ? Math.max((sign * (step.setVolts - endVolts)) / ohm, 1e-4)
        : null,
    stringIn,
  });
  if (knownEnd === null || toEnd) return run;
  // From a known end people stop by the count, so that its time is certain.
  const { seconds, ampHours } = run(model.nominal);
  return (sample) => ({ seconds, ampHours: ampHours * sample.currentFactor });
}

/** The set current where what was read is that one: how far it is off is in the samples; else as read. */
function asSetAmps(setAmps: number | null, { maxAmps }: Drive): number | null {
  if (setAmps === null || maxAmps === null) return maxAmps ?? setAmps;
  return Math.abs(maxAmps / setAmps - 1) <= SET_SHARE ? setAmps : maxAmps;
}

/** Set to its aim, and not above it (a trim of an on-the-mark charge may go over where the mark cannot be held). */
function isOnTheMark(
  model: PlanModel,
  option: PlanOption,
  step: PlannedStep,
  count: number,
  endVolts: number,
): boolean {
  if (option.finish !== 'on-the-mark' || step.setVolts === null) return false;
  return Math.abs(step.setVolts - endVolts) <= model.toleranceVolts * count;
}

function joinedString(model: PlanModel, step: PlannedStep, movedIn: MovedIn) {
  return (sample: Sample) => {
    const capacity = sample.capacityAh.reduce((sum, ampHours) => sum + ampHours, 0);
    const charge = sample.startSoc.reduce((sum, soc, group) => {
      const moved = movedIn(sample, group);
      return sum + soc * sample.capacityAh[group]! + (moved > 0 ? moved * model.efficiency : moved);
    }, 0);
    const perAmpHour = step.direction === 'charge' ? model.efficiency / capacity : -1 / capacity;
    return {
      string: stringCharge(model.curve, [charge / capacity], [perAmpHour]),
      ohm: 1 / sample.longOhm.reduce((sum, ohm) => sum + 1 / ohm, 0),
    };
  };
}

/**
 * A resistor's step, whose far end is not known here: its planned time, spread as the plan's own band is. The capacity's draw
 * stands in for all of them.
 */
function resistorRun(model: PlanModel, option: PlanOption, step: PlannedStep): SampleRun {
  const nominal = Math.max(step.stopS - step.startS, 1);
  const { p10, p50, p90 } = option.totalS;
  const shortest = Math.max(nominal * 0.05, nominal + p10 - p50);
  const sd =
    step.kind === 'pre-level' ? model.spreads.capacityRelative : Math.log((nominal + p90 - p50) / shortest) / NORMAL_80;
  return (sample) => {
    const factor = Math.exp(sd * sample.draws[CAPACITY_AXIS]!);
    return { seconds: (step.stopS - step.startS) * factor, ampHours: step.ampHours * factor };
  };
}
