import { voltsAtSoc } from '../curve/ocv';
import { socOf } from './soc-of';
import { equaliseThroughResistor } from '../equalise-through-resistor';
import { splitLongResistance } from '../resistance/long-resistance';
import type { NeighbourState, ResistorParameters } from '../plan-types';
import type { CellGroup } from '../types';
import { chooseAim, socPerAmpHour, type Aim } from './aim';
import { currentSeconds, type CurrentLaw } from './current-seconds';
import type { Draft, DraftStep, NotPossible } from './draft';
import type { PlanModel } from './plan-model';
import { resistorTrace } from './resistor-trace';
import type { Sample } from './samples';
import { groupsAt, sampleString } from './series-step';
import type { ModuleState } from './single-group';
import { ampHoursToFirst, ampHoursToVolts, stringCharge, stringVolts } from './string-charge';
import { trimSteps } from './trim';
import { ampsText, groupsText, voltsText } from './words';
import { mean } from '../statistics/mean';

/** Joined to a neighbour of known charge through a resistor, until the spare is at the target; no charger. */
export function resistorWay(
  model: PlanModel,
  neighbour: NeighbourState,
  resistor: ResistorParameters,
): Draft | NotPossible {
  const { module } = model.input;
  const { direction } = model;
  const sign = direction === 'charge' ? 1 : -1;
  const aim = chooseAim(model, direction);
  if (aim.ampHours <= 1e-6)
    return { reason: 'One group is at the target already; a current through all of them takes it past.' };
  const all = model.groups.map((_, group) => group);
  const spareSide = groupsAt(model, all, model.startSoc);
  const otherSide = neighbourGroups(model, neighbour);
  const result = equaliseThroughResistor({
    first: {
      groups: spareSide,
      curve: model.curve,
      linkResistanceOhm: module.linkResistanceOhm,
      coulombicEfficiency: model.efficiency,
    },
    second: {
      groups: otherSide,
      curve: model.curve,
      linkResistanceOhm: module.linkResistanceOhm,
      coulombicEfficiency: model.efficiency,
    },
    resistorOhm: resistor.ohm,
    stopDifferenceVolts: null,
    stopFirstRelaxedVolts: aim.sumVolts,
  });
  if (result.outcome !== 'target')
    return {
      reason: `${neighbour.label} rests at ${voltsText(mean(neighbour.groupVolts))} a group. Joined through a resistor both would settle at ${voltsText(result.firstRelaxedVolts / all.length)}, not at the target.`,
    };
  const allowed = Math.min(module.maxChargeAmps, module.maxDischargeAmps);
  if (result.peakAmps > allowed)
    return {
      reason: `${resistor.name} would let ${ampsText(result.peakAmps)} flow, the module takes ${ampsText(allowed)}. Take a larger resistor.`,
    };
  const watts = result.peakAmps ** 2 * resistor.ohm;
  if (watts > resistor.maxWatts)
    return {
      reason: `${resistor.name} would turn ${Math.ceil(watts)}\u00a0W into heat, it bears ${resistor.maxWatts}\u00a0W.`,
    };

  const socAfter = model.startSoc.map((soc, group) => soc + socPerAmpHour(model, group, direction) * result.ampHours);
  const endVolts = result.secondRelaxedVolts - result.firstRelaxedVolts;
  const ohmic = sumOf([...spareSide, ...otherSide].map((one) => one.ohmicResistanceOhm)) + 2 * module.linkResistanceOhm;
  const endAmps = endVolts / (resistor.ohm + ohmic);
  const run = sampleRun(model, aim, otherSide, resistor, sign);
  const scale = result.stopAtS / run(model.nominal).seconds;
  const bulk: DraftStep = {
    kind: 'bulk',
    way: 'resistor',
    channel: null,
    resistorId: resistor.resistorId,
    groupIndexes: all,
    together: false,
    direction,
    setVolts: null,
    setAmps: null,
    capVolts: null,
    seconds: result.stopAtS,
    voltageLimitAtS: 0,
    ampHours: result.ampHours,
    wattHours: result.ampHours * ((sumOf(model.startVolts) + result.firstRelaxedVolts) / 2),
    endAmps,
    settleS: 0,
    socAfter,
    polarisationAfter: all.map((group) => endAmps * model.groups[group]!.polarisationResistanceOhm),
    trace: resistorTrace({
      peakAmps: sign * result.peakAmps,
      endAmps,
      seconds: result.stopAtS,
      socFrom: model.startSoc,
      socTo: socAfter,
      terminalVolts: (soc, amps) =>
        soc.reduce(
          (sum, at, group) => sum + voltsAtSoc(model.curve, at) + amps * model.groups[group]!.ohmicResistanceOhm,
          0,
        ),
    }),
    groupsAcross: all.length,
    secondsIn: (sample) => run(sample).seconds * scale,
    ampHoursIn: (sample) => run(sample).ampHours,
  };
  const state: ModuleState = {
    soc: socAfter,
    polarisation: bulk.polarisationAfter,
    movedIn: (sample) => sign * bulk.ampHoursIn(sample),
  };
  const trim =
    aim.outside.length > 0
      ? trimSteps(model, 'over-and-settle', state, model.input.clipOnAtS + bulk.seconds)
      : { steps: [], left: [] };
  return {
    way: 'resistor',
    finish: 'over-and-settle',
    direction,
    steps: [bulk, ...trim.steps],
    setVolts: null,
    setVoltsCap: null,
    amps: result.peakAmps,
    busbarsOff: false,
    takes: `${resistor.name} between the module's terminals and those of ${neighbour.label}, plus to plus and minus to minus. No charger.`,
    cautions:
      trim.left.length === 0
        ? []
        : [
            {
              code: 'ends-apart',
              text: `${groupsText(trim.left)} ${trim.left.length === 1 ? 'ends' : 'end'} outside the tolerance. No channel here that clips to one group can finish ${trim.left.length === 1 ? 'it' : 'them'} alone.`,
            },
          ],
  };
}

function neighbourGroups(model: PlanModel, neighbour: NeighbourState): CellGroup[] {
  const one = model.groups[0]!;
  const longOhm = ((one.ohmicResistanceOhm + one.polarisationResistanceOhm) * one.capacityAh) / neighbour.capacityAh;
  return neighbour.groupVolts.map((restVolts) => ({
    capacityAh: neighbour.capacityAh,
    ...splitLongResistance(longOhm),
    polarisationTimeConstantS: one.polarisationTimeConstantS,
    restVolts,
  }));
}

function sampleRun(
  model: PlanModel,
  aim: Aim,
  otherSide: CellGroup[],
  resistor: ResistorParameters,
  sign: 1 | -1,
): (sample: Sample) => { seconds: number; ampHours: number } {
  const all = model.groups.map((_, group) => group);
  const stringIn = sampleString(model, all, model.direction, () => 0);
  const known = new Map<Sample, { seconds: number; ampHours: number }>();
  return (sample) => {
    const before = known.get(sample);
    if (before) return before;
    const { string, ohm } = stringIn(sample);
    const factor = sample.capacityAh[0]! / model.nominal.capacityAh[0]!;
    const other = stringCharge(
      model.curve,
      otherSide.map((group) => socOf(model.curve, group.restVolts + sample.spareShiftVolts)),
      otherSide.map((group) => (-sign * (sign > 0 ? 1 : model.efficiency)) / (group.capacityAh * factor)),
    );
    const goal = aim.sumVolts + all.length * sample.targetShiftVolts;
    const ampHours =
      aim.kind === 'first' ? Math.max(0, ampHoursToFirst(string, sample.targetSoc)) : ampHoursToVolts(string, goal);
    const otherOhm = sumOf(otherSide.map((group) => group.ohmicResistanceOhm + group.polarisationResistanceOhm));
    const gap = Math.abs(stringVolts(other, 0) - stringVolts(string, 0));
    const law: CurrentLaw = {
      openVolts: (moved) => stringVolts(string, moved),
      otherVolts: (moved) => stringVolts(other, moved),
      sign,
      maxAmps: Infinity,
      setVolts: null,
      maxWatts: null,
      resistanceOhm: ohm + otherOhm + 2 * model.input.module.linkResistanceOhm,
      loadOhm: resistor.ohm,
      // A neighbour that levels out before the target: as if it gave a fiftieth of its first current.
      leastAmps: Math.max(gap / resistor.ohm / 50, 1e-6),
    };
    const found = { seconds: currentSeconds(law, ampHours), ampHours };
    known.set(sample, found);
    return found;
  };
}

const sumOf = (values: number[]): number => values.reduce((sum, value) => sum + value, 0);
