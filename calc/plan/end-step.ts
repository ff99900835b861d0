import { chargeThroughTerminals } from '../charge-through-terminals';
import { slopeAtSoc, voltsAtSoc } from '../curve/ocv';
import type { ChannelParameters, Way } from '../plan-types';
import { setVoltageCap } from '../set-voltage-cap';
import { chargerDraft } from './charger-draft';
import type { DraftStep, NotPossible } from './draft';
import type { PlanModel } from './plan-model';
import { channelAmps, moduleCurrentShare, snappedAmps } from './charger-amps';
import { leadOhmOf } from './leads';
import { groupsAt, prechargeAmps, sampleString } from './series-step';
import { limitText } from './words';

/** Current at which a taper counts as full or empty, as a multiple of the capacity per hour: C/20, common practice. */
export const END_RATE_C = 0.05;

/**
 * Brings groups to a known end: charging at constant current and then at the voltage at which they are full with a
 * twentieth of their capacity per hour still flowing; discharging the same way down to the type's limit.
 *
 * @param soc of all groups of the module before
 */
export function endStep(
  model: PlanModel,
  end: 'full' | 'empty',
  way: Way,
  channel: ChannelParameters,
  groupIndexes: number[],
  soc: readonly number[],
): DraftStep | NotPossible {
  const { module } = model.input;
  const charging = end === 'full';
  const sign = charging ? 1 : -1;
  const direction = charging ? 'charge' : 'discharge';
  const count = groupIndexes.length;
  if (!charging && (!channel.canDischarge || channel.loadOhm !== null || !channel.adjustableVolts))
    return { reason: `${channel.name} cannot stop a discharge at a voltage.` };
  const groups = groupsAt(model, groupIndexes, soc);
  const linkOhm = way === 'terminals' ? module.linkResistanceOhm : 0;
  const leadResistanceOhm = leadOhmOf(channel);
  const endAmps = END_RATE_C * Math.min(...groups.map((group) => group.capacityAh));
  const maxAmps = charging
    ? snappedAmps(
        channel,
        Math.min(
          channelAmps(channel, channel.maxAmps, model.input.celsius),
          module.maxChargeAmps * moduleCurrentShare(module, model.celsius),
          prechargeAmps(model, direction, groups) ?? Infinity,
        ),
      )
    : snappedAmps(channel, Math.min(channel.dischargeAmps ?? channel.maxAmps, module.maxDischargeAmps));
  if (maxAmps <= endAmps)
    return { reason: `${channel.name} is too weak to find the ${end === 'full' ? 'full' : 'empty'} end.` };
  const ohm =
    linkOhm +
    leadResistanceOhm +
    groups.reduce((sum, one) => sum + one.ohmicResistanceOhm + one.polarisationResistanceOhm, 0);
  const endSoc = charging ? 1 : 0;
  const wanted = count * voltsAtSoc(model.curve, endSoc) + sign * endAmps * ohm;
  const cap = setVoltageCap({
    groups,
    curve: model.curve,
    limitVolts: charging ? module.chargeLimitVolts : module.dischargeLimitVolts,
    direction,
    coulombicEfficiency: model.efficiency,
  }).volts;
  const asWished = charging ? Math.min(wanted, cap) : Math.max(wanted, cap);
  const setVolts = channel.adjustableVolts ? dialled(asWished, channel.displayStepVolts, sign) : channel.maxVolts;
  if (charging && channel.maxVolts < setVolts)
    return {
      reason: `${channel.name} reaches ${limitText(channel.maxVolts)}, full is ${limitText(setVolts)} between the clips.`,
    };
  if (!channel.adjustableVolts && setVolts > cap + 1e-9)
    return {
      reason: `${channel.name} always charges to ${limitText(channel.maxVolts)}. Past ${limitText(cap)} a group would be over its limit.`,
      ceiling: true,
    };
  const source = {
    maxAmps: maxAmps * (channel.duty ?? 1),
    setVolts,
    maxWatts: channel.maxWatts,
    leadResistanceOhm,
    heldGroupVolts: null,
    loadOhm: null,
  };
  const result = chargeThroughTerminals(
    {
      groups,
      curve: model.curve,
      linkResistanceOhm: linkOhm,
      coulombicEfficiency: model.efficiency,
      direction,
      source,
      stop: { relaxedVolts: null, toleranceVolts: 0, cutoffAmps: Math.max(endAmps, channel.minAmps), groupVolts: null },
      settledVolts: model.settledVolts(count),
    },
    { trace: true },
  );
  if (result.outcome !== 'cutoff')
    return {
      reason: `${channel.name} does not bring the module to a known end: ${result.reason ?? 'the current does not fall.'}`,
    };
  const reached = result.groups.map((group) => group.soc);
  if (slopeAtSoc(model.curve, reached[0]!) <= 0 || Math.abs(reached[0]! - endSoc) > 0.1)
    return {
      reason: `With ${channel.name} the module ends at ${Math.round(reached[0]! * 100)}\u00a0% of charge, which is no known end.`,
    };

  const socAfter = [...soc];
  groupIndexes.forEach((group, at) => (socAfter[group] = reached[at]!));
  return chargerDraft(
    model,
    result,
    {
      kind: 'bulk',
      way,
      channel,
      groupIndexes,
      direction,
      setVolts,
      setAmps: maxAmps,
      socAfter,
      polarisationAfter: result.groups.map((group) => group.polarisationVolts),
      capVolts: cap,
    },
    {
      source,
      sign,
      count,
      linkOhm,
      aimVolts: setVolts,
      first: false,
      endAmps: Math.max(endAmps, channel.minAmps),
      stringIn: sampleString(model, groupIndexes, direction, () => 0),
    },
  );
}

/** The nearest that can be dialled in without passing the end. */
function dialled(volts: number, step: number, sign: 1 | -1): number {
  if (!(step > 0)) return volts;
  const steps = sign > 0 ? Math.floor(volts / step + 1e-9) : Math.ceil(volts / step - 1e-9);
  return Math.round(steps * step * 1e6) / 1e6;
}
