import { joinGroups } from '../charge-paralleled';
import { chargeThroughTerminals } from '../charge-through-terminals';
import { compileCurve } from '../curve/compiled-curve';
import { curveVolts } from '../curve/ocv';
import type { ChannelParameters, PlannedStep } from '../plan-types';
import type { PlanModel } from '../plan/plan-model';
import { mean } from '../statistics/mean';
import type { CellGroup, Source } from '../types';
import type { Drive, Forward, Lane } from './lane';
import type { ModuleState } from './module-state';
import { meanSetAmps, plannedSource } from './planned-source';

/** In other tapers the current at the planned end stands in for a target that a shifted set voltage never quite reaches. */
const END_AMPS_SHARE = 0.98;
const LEAST_END_AMPS = 1e-3;
/** Near the end: amps within this many times the planned end current, rest voltage within this of the aim, V a group. */
const NEAR_END_AMPS = 2;
const NEAR_END_VOLTS = 0.002;
/** Times the planned end current that may still flow once on the mark is reached. */
const TRICKLE = 1.5;

/** A step on a charger or load, run by the core. */
export function seriesLane(model: PlanModel, step: PlannedStep, index: number, channel: ChannelParameters): Lane {
  const sign = step.direction === 'charge' ? 1 : -1;
  const joined = step.way === 'paralleled';
  const { module } = model.input;
  const linkOhm = step.way === 'terminals' ? module.linkResistanceOhm : 0;
  const source = plannedSource(model, step, channel);
  const setAmps = meanSetAmps(step, channel);
  const aimVolts = joined
    ? step.restVoltsAfter[step.groupIndexes[0]!]!
    : step.groupIndexes.reduce((sum, group) => sum + step.restVoltsAfter[group]!, 0);
  const curve = compileCurve(model.curve);
  const { groupIndexes } = step;
  const own = groupIndexes.map((group) => model.groups[group]!);
  const parts = joined ? [joinGroups(own, model.curve)] : own;
  const capacityAh = own.reduce((sum, group) => sum + group.capacityAh, 0);
  /** Groups that are joined share their charge. */
  const joinedSoc = ({ soc }: ModuleState): number =>
    groupIndexes.reduce((charge, group, at) => charge + soc[group]! * own[at]!.capacityAh, 0) / capacityAh;
  const socOf = (state: ModuleState, at: number): number => (joined ? joinedSoc(state) : state.soc[groupIndexes[at]!]!);
  const overOf = (state: ModuleState, at: number): number =>
    joined ? mean(groupIndexes.map((group) => state.over[group]!)) : state.over[groupIndexes[at]!]!;
  const groupsOf = (state: ModuleState): CellGroup[] =>
    parts.map((part, at) => ({
      ...part,
      restVolts: curveVolts(curve, socOf(state, at)),
      polarisationVolts: overOf(state, at),
    }));
  let known: { restVolts: number; volts: number } | null = null;
  let knownOf: ModuleState | null = null;
  /** Summed rest voltage, and with what is over it; kept, since a state is asked for several times in a row. */
  const voltsOf = (state: ModuleState): { restVolts: number; volts: number } => {
    if (known !== null && knownOf === state) return known;
    let restVolts = 0;
    let over = 0;
    for (let at = 0; at < parts.length; at += 1) {
      restVolts += curveVolts(curve, socOf(state, at));
      over += overOf(state, at);
    }
    knownOf = state;
    return (known = { restVolts, volts: restVolts + over });
  };
  const driven = (drive: Drive): Source => ({
    ...source,
    maxAmps: drive.maxAmps ?? source.maxAmps,
    setVolts: source.setVolts === null ? null : source.setVolts + drive.setShiftVolts,
  });
  const spread = (state: ModuleState, seconds: number, soc: number[], over: number[]): ModuleState => {
    const next = { s: state.s + seconds, soc: [...state.soc], over: [...state.over] };
    step.groupIndexes.forEach((group, at) => {
      next.soc[group] = soc[joined ? 0 : at]!;
      next.over[group] = over[joined ? 0 : at]!;
    });
    return next;
  };
  const efficiency = sign > 0 ? model.efficiency : 1;

  const count = joined ? 1 : step.groupIndexes.length;
  const onTheMark = source.setVolts !== null && Math.abs(source.setVolts - aimVolts) <= model.toleranceVolts * count;
  const tapers = source.setVolts !== null && endsByAmps(step, setAmps);
  const byAmps = onTheMark && tapers;
  const forward = (state: ModuleState, drive: Drive, maxSeconds: number | null, onwards = false): Forward => {
    const groups = groupsOf(state);
    const result = chargeThroughTerminals({
      groups,
      curve: model.curve,
      linkResistanceOhm: linkOhm,
      coulombicEfficiency: model.efficiency,
      direction: step.direction,
      source: driven(drive),
      stop: {
        // On the mark people go by the amps; where the module stands then is as well as the charge is known.
        relaxedVolts: onwards || byAmps ? null : aimVolts,
        toleranceVolts: onwards || byAmps ? 0 : 1e-9,
        cutoffAmps:
          tapers && !onwards ? Math.max(Math.abs(step.endAmps) * (byAmps ? 1 : END_AMPS_SHARE), LEAST_END_AMPS) : null,
        groupVolts: null,
        maxSeconds,
      },
      settledVolts: model.settledVolts(groups.length),
    });
    // The plan was reachable; a set voltage that a reading has shifted may not be, and then the amps alone are believed.
    if (result.outcome === 'unreachable' && drive.setShiftVolts !== 0)
      return forward(state, { ...drive, setShiftVolts: 0 }, maxSeconds, onwards);
    const taperAfterS =
      result.voltageLimitAtS !== null && result.outcome !== 'unreachable' ? result.voltageLimitAtS : null;
    return {
      seconds: result.stopAtS,
      ended: result.outcome !== 'time-cap',
      taperAfterS,
      ampHours: result.ampHours,
      amps: result.endAmps,
      state:
        result.outcome === 'unreachable'
          ? state
          : spread(
              state,
              result.stopAtS,
              result.groups.map((group) => group.soc),
              result.groups.map((group) => group.polarisationVolts),
            ),
    };
  };

  const moduleOhm = parts.reduce((sum, part) => sum + part.ohmicResistanceOhm, linkOhm);
  const totalOhm = moduleOhm + source.leadResistanceOhm;

  return {
    index,
    step,
    sign,
    setAmps,
    trickleAmps: onTheMark ? TRICKLE * Math.abs(step.endAmps) : 0,
    touched: step.groupIndexes,
    forward,
    ampsAt: (state, drive) => {
      const { maxAmps, setVolts, maxWatts, loadOhm } = driven(drive);
      const { volts } = voltsOf(state);
      const root = maxWatts === null ? 0 : volts * volts + sign * 4 * totalOhm * maxWatts;
      const least = Math.min(
        maxAmps ?? Infinity,
        setVolts === null ? Infinity : (sign * (setVolts - volts)) / totalOhm,
        maxWatts === null || root <= 0 ? Infinity : (2 * maxWatts) / (volts + Math.sqrt(root)),
        loadOhm === null ? Infinity : volts / (totalOhm + loadOhm),
      );
      return Math.max(0, least);
    },
    moved: (state, fromAmps, toAmps, seconds) => {
      if (seconds <= 0) return state;
      const ampHours = ((fromAmps + toAmps) / 2) * (seconds / 3600);
      const soc: number[] = [];
      const over: number[] = [];
      let tau = NaN;
      let decay = NaN;
      for (let at = 0; at < parts.length; at += 1) {
        const part = parts[at]!;
        if (part.polarisationTimeConstantS !== tau) {
          tau = part.polarisationTimeConstantS;
          decay = Math.exp(-seconds / tau);
        }
        soc.push(socOf(state, at) + (sign * efficiency * ampHours) / part.capacityAh);
        over.push(overAfter(part, overOf(state, at), sign * fromAmps, sign * toAmps, seconds, decay));
      }
      return spread(state, seconds, soc, over);
    },
    clipVolts: (state, amps) => voltsOf(state).volts + sign * amps * moduleOhm,
    isNearEnd: (state, amps) => {
      if (tapers && amps < NEAR_END_AMPS * Math.abs(step.endAmps)) return true;
      return sign * (aimVolts - voltsOf(state).restVolts) < NEAR_END_VOLTS * count;
    },
    atSetVolts: (terminalVolts, amps) =>
      source.setVolts !== null &&
      sign * (source.setVolts - terminalVolts) <=
        amps * source.leadResistanceOhm +
          Math.max(channel.displayStepVolts, 0.002 * (joined ? 1 : step.groupIndexes.length)),
    driveInTaper: (state, amps) => {
      if (!tapers) return { maxAmps: amps, setShiftVolts: 0, seenInTaper: false };
      const needed = voltsOf(state).volts + sign * amps * totalOhm;
      return {
        maxAmps: null,
        setShiftVolts: source.setVolts === null ? 0 : needed - source.setVolts,
        seenInTaper: true,
      };
    },
  };
}

/**
 * Over-voltage after a current that goes straight from one value to another: the RC branch in closed form.
 *
 * @param decay e^(−t/τ) of those seconds
 */
function overAfter(
  group: CellGroup,
  over: number,
  fromAmps: number,
  toAmps: number,
  seconds: number,
  decay: number,
): number {
  const { polarisationResistanceOhm: ohm, polarisationTimeConstantS: tau } = group;
  if (!(tau > 0)) return 0;
  const slope = (toAmps - fromAmps) / seconds;
  const lag = ohm * slope * tau;
  return (over - ohm * fromAmps + lag) * decay + ohm * toAmps - lag;
}

/** A step that was planned to end in a taper and not in constant current. */
function endsByAmps(step: PlannedStep, setAmps: number | null): boolean {
  return step.voltageLimitAtS !== null && setAmps !== null && Math.abs(step.endAmps) < setAmps * 0.9;
}
