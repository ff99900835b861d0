import { voltsAtSoc } from '../curve/ocv';
import type { LiveReading } from '../live-types';
import type { PlanModel } from '../plan/plan-model';
import { chargerSd } from '../plan/sample-run';
import type { LiveRound } from './live-rounds';
import type { ModuleState } from './module-state';

/** What the one-RC model and the curve's shape may be off under current, V a group. */
const MODEL_SD_VOLTS = 0.004;

/**
 * Probability of a reading between the clips at least as far from the reckoned volts as this one is: two-sided, normal, with
 * the spread of the samples, the charger's meter, its last digit and the model together.
 *
 * @param state module by the model at the reading
 * @param movedAh charge gone into each group until then
 * @returns null where the reading has no volts or amps, or is not of one step on one charger
 */
export function readingChance(
  model: PlanModel,
  round: LiveRound,
  reading: LiveReading,
  state: ModuleState,
  movedAh: readonly number[],
): number | null {
  if (reading.terminalVolts === null || reading.amps === null || round.lanes.length !== 1) return null;
  const lane = round.lanes[0]!;
  const channel = model.input.channels.find((one) => one.channelId === lane.step.channelIds[0]);
  if (!channel) return null;
  const amps = Math.abs(reading.amps);
  const groups = lane.step.way === 'paralleled' ? [lane.step.groupIndexes[0]!] : lane.step.groupIndexes;
  // A charger that senses its own terminals shows the drop over its leads too.
  const leads = channel.senses === 'module' ? 0 : lane.sign * amps * channel.leadResistanceOhm;
  const reckoned = lane.clipVolts(state, amps) + leads;
  const offs = model.samples.map((sample) =>
    groups.reduce((sum, group) => {
      const moved = movedAh[group]! > 0 ? movedAh[group]! * model.efficiency : movedAh[group]!;
      const soc = sample.startSoc[group]! + moved / sample.capacityAh[group]!;
      const nominalOhm = model.nominal.longOhm[group]!;
      const over =
        (state.over[group]! + lane.sign * amps * model.groups[group]!.ohmicResistanceOhm) *
        (sample.longOhm[group]! / nominalOhm - 1);
      const share = lane.step.way === 'paralleled' ? 1 / lane.step.groupIndexes.length : 1;
      return (
        sum +
        voltsAtSoc(model.curve, soc) -
        sample.curveShiftVolts -
        voltsAtSoc(model.curve, state.soc[group]!) +
        over * share
      );
    }, 0),
  );
  const mean = offs.reduce((sum, value) => sum + value, 0) / offs.length;
  const spread = offs.reduce((sum, value) => sum + (value - mean) ** 2, 0) / Math.max(1, offs.length - 1);
  const meter = chargerSd(model, channel, groups.length) ** 2 + channel.displayStepVolts ** 2 / 12;
  const hysteresis = (model.spreads.hysteresisVolts * groups.length) ** 2 / 3;
  const variance = spread + meter + (MODEL_SD_VOLTS * groups.length) ** 2 + hysteresis;
  // The leads may or may not be in what was read: the nearer of the two counts.
  const off = Math.min(
    Math.abs(reading.terminalVolts - reckoned - mean),
    Math.abs(reading.terminalVolts - reckoned + leads - mean),
  );
  return twoSided(off / Math.sqrt(variance));
}

/** P(|Z| > z): Abramowitz and Stegun, Handbook of Mathematical Functions (1964), 7.1.26, error below 1.5e-7. */
function twoSided(z: number): number {
  const x = z / Math.SQRT2;
  const t = 1 / (1 + 0.3275911 * x);
  const series = t * (0.254829592 + t * (-0.284496736 + t * (1.421413741 + t * (-1.453152027 + t * 1.061405429))));
  return Math.min(1, series * Math.exp(-x * x));
}
