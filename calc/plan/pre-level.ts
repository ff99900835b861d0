import { joinGroups } from '../charge-paralleled';
import { voltsAtSoc } from '../curve/ocv';
import { equaliseThroughResistor } from '../equalise-through-resistor';
import { joiningInrush } from '../joining-inrush';
import type { ResistorParameters } from '../plan-types';
import type { DraftStep, NotPossible } from './draft';
import type { PlanModel } from './plan-model';
import { groupsAt } from './series-step';
import { resistorTrace } from './resistor-trace';
import { ampsText, groupText } from './words';

/** Levelled this far under the inrush limit, so that a reading's millivolt does not push it over. */
const INRUSH_MARGIN = 0.9;

export interface PreLevel {
  steps: DraftStep[];
  /** Of all groups, just before they are joined. */
  soc: number[];
  /** Largest current into one group if all were joined as they are, A. */
  inrushAmps: number;
  limitAmps: number;
}

/**
 * Makes the groups fit to be joined: those that may be joined are, from the middle one outwards; each of the others is first
 * brought near them through a resistor of the workshop's list, the smallest that bears its current and its heat.
 *
 * The limit is the workshop's multiple of one group's capacity per hour.
 */
export function preLevel(model: PlanModel): PreLevel | NotPossible {
  const all = model.groups.map((_, group) => group);
  const soc = [...model.startSoc];
  const limitAmps = model.input.workshop.inrushLimitC * Math.min(...model.groups.map((group) => group.capacityAh));
  const { inrushAmps } = joiningInrush(groupsAt(model, all, soc));
  const done: PreLevel = { steps: [], soc, inrushAmps, limitAmps };
  if (inrushAmps <= limitAmps) return done;

  const byVolts = [...all].sort((a, b) => model.startVolts[a]! - model.startVolts[b]!);
  const middle = byVolts[Math.floor(byVolts.length / 2)]!;
  const near = (group: number): number => Math.abs(model.startVolts[group]! - model.startVolts[middle]!);
  const joined = [middle];
  const outliers: number[] = [];
  for (const group of [...all].sort((a, b) => near(a) - near(b) || a - b)) {
    if (group === middle) continue;
    if (joiningInrush(groupsAt(model, [...joined, group], soc)).inrushAmps <= limitAmps) joined.push(group);
    else outliers.push(group);
  }
  level(model, joined, soc);
  for (const group of outliers) {
    const step = levelOne(model, group, joined, soc, limitAmps, inrushAmps);
    if ('reason' in step) return step;
    done.steps.push(step);
    step.socAfter.forEach((at, index) => (soc[index] = at));
    joined.push(group);
    level(model, joined, soc);
  }
  return done;
}

/** Joined groups share their charge. */
function level(model: PlanModel, joined: number[], soc: number[]): void {
  const capacity = joined.reduce((sum, group) => sum + model.groups[group]!.capacityAh, 0);
  const charge = joined.reduce((sum, group) => sum + model.groups[group]!.capacityAh * soc[group]!, 0);
  for (const group of joined) soc[group] = charge / capacity;
}

function levelOne(
  model: PlanModel,
  group: number,
  joined: number[],
  soc: number[],
  limitAmps: number,
  inrushAmps: number,
): DraftStep | NotPossible {
  const [one] = groupsAt(model, [group], soc);
  const rest = joinGroups(groupsAt(model, joined, soc), model.curve);
  const ohmic = one!.ohmicResistanceOhm + rest.ohmicResistanceOhm;
  const gap = Math.abs(one!.restVolts - rest.restVolts);
  const resistor = fittingResistor(model.input.resistors, gap, ohmic, limitAmps);
  if (resistor === null) {
    const list = model.input.resistors.length === 0 ? 'No resistor is on the list' : 'No resistor on the list is fit';
    return {
      reason: `Joining would push ${ampsText(inrushAmps)} through a group, ${ampsText(limitAmps)} is the limit. ${list} to level ${groupText(group)} first.`,
    };
  }
  const result = equaliseThroughResistor({
    first: { groups: [one!], curve: model.curve, coulombicEfficiency: model.efficiency },
    second: { groups: [rest], curve: model.curve, coulombicEfficiency: model.efficiency },
    resistorOhm: resistor.ohm,
    stopDifferenceVolts: limitAmps * ohmic * INRUSH_MARGIN,
  });
  const up = one!.restVolts < rest.restVolts;
  const socAfter = [...soc];
  const shift = (ampHours: number, into: boolean): number => (into ? ampHours * model.efficiency : -ampHours);
  socAfter[group]! += shift(result.ampHours, up) / one!.capacityAh;
  for (const other of joined) socAfter[other]! += shift(result.ampHours, !up) / rest.capacityAh;
  const nominalAh = model.nominal.capacityAh[group]!;
  const endAmps = (limitAmps * ohmic * INRUSH_MARGIN) / (ohmic + resistor.ohm);
  return {
    kind: 'pre-level',
    way: 'resistor',
    channel: null,
    resistorId: resistor.resistorId,
    groupIndexes: [group],
    together: false,
    direction: up ? 'charge' : 'discharge',
    setVolts: null,
    setAmps: null,
    capVolts: null,
    seconds: result.stopAtS,
    voltageLimitAtS: result.stopAtS > 0 ? 0 : null,
    ampHours: result.ampHours,
    wattHours: result.ampHours * voltsAtSoc(model.curve, soc[group]!),
    endAmps: up ? endAmps : -endAmps,
    settleS: 0,
    socAfter,
    polarisationAfter: [0],
    trace: resistorTrace({
      peakAmps: up ? result.peakAmps : -result.peakAmps,
      endAmps: up ? endAmps : -endAmps,
      seconds: result.stopAtS,
      socFrom: [soc[group]!],
      socTo: [socAfter[group]!],
      terminalVolts: (socs) => voltsAtSoc(model.curve, socs[0]!),
    }),
    groupsAcross: 1,
    // An exponential in time: its constant goes with the capacity.
    secondsIn: (sample) => (result.stopAtS * sample.capacityAh[group]!) / nominalAh,
    ampHoursIn: (sample) => (result.ampHours * sample.capacityAh[group]!) / nominalAh,
  };
}

function fittingResistor(
  resistors: ResistorParameters[],
  gapVolts: number,
  ohmicOhm: number,
  limitAmps: number,
): ResistorParameters | null {
  const fitting = resistors.filter(({ ohm, maxWatts }) => {
    const amps = gapVolts / (ohm + ohmicOhm);
    return ohm > 0 && amps <= limitAmps && amps * amps * ohm <= maxWatts;
  });
  return fitting.sort((a, b) => a.ohm - b.ohm)[0] ?? null;
}
