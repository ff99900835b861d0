import { setVoltageCap } from '../set-voltage-cap';
import type { ChannelParameters } from '../plan-types';
import type { CellGroup, Direction, Source } from '../types';
import { channelAmps, moduleCurrentShare, snappedAmps } from './charger-amps';
import { leadOhmOf } from './leads';
import { ampsText, limitText } from './words';
import type { PlanModel } from './plan-model';

/** What over and settle adds to the target beside the drop over the resistances, V a group. */
const OVER_VOLTS_PER_GROUP = 0.02;

/** What a channel is set to for one step. */
export interface SourceSettings {
  source: Source;
  /** Dialled-in amps; null where a resistor rules. */
  setAmps: number | null;
  setVolts: number | null;
  /** Highest (discharging: lowest) set voltage that does no harm, V over the groups; null: nothing to set. */
  capVolts: number | null;
}

export interface Setting {
  model: PlanModel;
  channel: ChannelParameters;
  direction: Direction;
  finish: 'on-the-mark' | 'over-and-settle';
  /** The groups in series between the clips, as they stand when the step begins. */
  groups: CellGroup[];
  /** Ohm of the module's links between the clips. */
  linkOhm: number;
  /** Times the module's current limit that may pass: the number of groups where they are paralleled. */
  limitTimes: number;
  /** Summed rest voltage aimed at, V. */
  aimVolts: number;
  /** Most amps of this step besides, A; left out: no such limit. */
  mostAmps?: number;
}

/**
 * Sets a channel: amps from its own and the module's limit, volts from the finish and the cap.
 *
 * On the mark: the aim. Over and settle: the least of the charger's ceiling, the aim with the drop over all resistances and
 * 20 mV a group, and the sum of all groups' rest voltages at the state in which the first one rests at its limit.
 *
 * @returns the settings, or the reason in a sentence why the channel cannot do it
 */
export function settleSource(setting: Setting): SourceSettings | { reason: string; ceiling?: boolean } {
  const amps = allowedAmps(setting);
  if ('reason' in amps) return amps;
  const { channel, direction, finish, aimVolts, groups } = setting;
  const sign = direction === 'charge' ? 1 : -1;
  const leadOhm = leadOhmOf(channel);
  const source: Source = {
    // Over thermal pauses the current is its mean.
    maxAmps: amps.maxAmps * (channel.duty ?? 1),
    setVolts: null,
    maxWatts: channel.maxWatts,
    leadResistanceOhm: leadOhm,
    heldGroupVolts: null,
    loadOhm: amps.loadOhm,
  };
  const blind = direction === 'discharge' && (amps.loadOhm !== null || !channel.adjustableVolts);
  if (blind) {
    if (finish === 'on-the-mark') return { reason: `${channel.name} has no voltage to set for a discharge.` };
    return { source, setAmps: amps.loadOhm === null ? amps.maxAmps : null, setVolts: null, capVolts: null };
  }

  const cap = highestSafeVolts(setting, amps.maxAmps, leadOhm);
  const reach = direction === 'charge' ? channel.maxVolts : Infinity;
  if (direction === 'charge' && reach < aimVolts + (finish === 'on-the-mark' ? -1e-9 : 1e-6))
    return {
      reason: `${channel.name} reaches ${limitText(reach)}, the target is ${limitText(aimVolts)} between the clips: unreachable.`,
    };
  if (!channel.adjustableVolts) {
    if (finish === 'on-the-mark') return { reason: `${channel.name} has no voltage to set.` };
    if (channel.maxVolts > cap.volts + 1e-9)
      return {
        reason: `${channel.name} always charges to ${limitText(channel.maxVolts)} and cannot be set. Forgotten, it would go past the ${limitText(cap.volts)} that is safe here.`,
        ceiling: true,
      };
    return withVolts(source, amps.maxAmps, channel.maxVolts, cap.volts);
  }

  const wanted = finish === 'on-the-mark' ? aimVolts : cap.volts;
  const step = channel.displayStepVolts;
  const setVolts = finish === 'on-the-mark' ? nearest(wanted, step) : inward(wanted, step, sign);
  const markVolts = setting.model.markVolts * groups.length;
  if (
    finish === 'on-the-mark' &&
    (sign * (aimVolts - setVolts) > markVolts * 0.9 || sign * (setVolts - cap.safeVolts) > 1e-6)
  )
    return {
      reason: `${channel.name} is set in steps of ${Math.round(step * 1000)} mV: too coarse for this tolerance.`,
    };
  if (finish === 'over-and-settle' && sign * (setVolts - aimVolts) <= 1e-6)
    return {
      reason: `The limit of a group leaves no room above the target: ${limitText(cap.volts)} is the most between the clips.`,
    };
  return withVolts(source, amps.maxAmps, setVolts, cap.volts);
}

const withVolts = (source: Source, maxAmps: number, setVolts: number, capVolts: number): SourceSettings => ({
  source: { ...source, setVolts },
  setAmps: maxAmps,
  setVolts,
  capVolts,
});

function allowedAmps(setting: Setting): { maxAmps: number; loadOhm: number | null } | { reason: string } {
  const { channel, direction, model, limitTimes, groups } = setting;
  const { module } = model.input;
  if (direction === 'charge')
    return {
      maxAmps: snappedAmps(
        channel,
        Math.min(
          channelAmps(channel, channel.maxAmps, model.input.celsius),
          module.maxChargeAmps * moduleCurrentShare(module, model.celsius) * limitTimes,
          setting.mostAmps ?? Infinity,
        ),
      ),
      loadOhm: null,
    };
  if (!channel.canDischarge) return { reason: `${channel.name} cannot discharge.` };
  const limit = module.maxDischargeAmps * limitTimes;
  if (channel.loadOhm !== null) {
    const volts = groups.reduce((sum, group) => sum + group.restVolts, 0);
    const ohm =
      channel.loadOhm + channel.leadResistanceOhm + groups.reduce((sum, one) => sum + one.ohmicResistanceOhm, 0);
    const amps = volts / ohm;
    if (amps > limit)
      return {
        reason: `The load of ${channel.name} would draw ${ampsText(amps)}, the module gives ${ampsText(limit)} at most.`,
      };
    if (channel.maxWatts !== null && amps * amps * channel.loadOhm > channel.maxWatts)
      return {
        reason: `The load of ${channel.name} would turn ${Math.round(amps * amps * channel.loadOhm)} W into heat, it bears ${channel.maxWatts} W.`,
      };
    return { maxAmps: Math.min(limit, channel.dischargeAmps ?? Infinity), loadOhm: channel.loadOhm };
  }
  return { maxAmps: snappedAmps(channel, Math.min(channel.dischargeAmps ?? channel.maxAmps, limit)), loadOhm: null };
}

/** The cap of over and settle, and of it the part that keeps every group inside its limit. */
function highestSafeVolts(setting: Setting, amps: number, leadOhm: number): { volts: number; safeVolts: number } {
  const { model, channel, direction, groups, linkOhm, aimVolts } = setting;
  const { module } = model.input;
  const safe = setVoltageCap({
    groups,
    curve: model.curve,
    limitVolts: direction === 'charge' ? module.chargeLimitVolts : module.dischargeLimitVolts,
    direction,
    coulombicEfficiency: model.efficiency,
  });
  const ohm = groups.reduce(
    (sum, one) => sum + one.ohmicResistanceOhm + one.polarisationResistanceOhm,
    linkOhm + leadOhm,
  );
  const over = amps * ohm + OVER_VOLTS_PER_GROUP * groups.length;
  const volts =
    direction === 'charge'
      ? Math.min(channel.maxVolts, aimVolts + over, safe.volts)
      : Math.max(aimVolts - over, safe.volts);
  return { volts, safeVolts: safe.volts };
}

/** The nearest value that can be dialled in. */
const nearest = (volts: number, step: number): number => (step > 0 ? tidy(Math.round(volts / step) * step) : volts);

/** The nearest that does not pass the limit. */
const inward = (volts: number, step: number, sign: 1 | -1): number => {
  if (!(step > 0)) return volts;
  return tidy(sign > 0 ? Math.floor(volts / step + 1e-9) * step : Math.ceil(volts / step - 1e-9) * step);
};

const tidy = (volts: number): number => Math.round(volts * 1e6) / 1e6;
