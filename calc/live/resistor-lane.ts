import { voltsAtSoc } from '../curve/ocv';
import { socOf } from '../plan/soc-of';
import type { PlannedStep } from '../plan-types';
import type { PlanModel } from '../plan/plan-model';
import type { Drive, Forward, Lane } from './lane';
import type { ModuleState } from './module-state';

/**
 * A step through a resistor. What it joins to is not known here any more; its plan is: the current falls in proportion to the
 * charge that has passed, from the first to the last ampere of the plan, and the groups go from where they stood to where the
 * plan leaves them.
 *
 * @param socBefore of all groups when the step begins
 */
export function resistorLane(model: PlanModel, step: PlannedStep, index: number, socBefore: readonly number[]): Lane {
  const sign = step.direction === 'charge' ? 1 : -1;
  const socAfter = step.restVoltsAfter.map((volts) => socOf(model.curve, volts));
  const lastAmps = Math.max(Math.abs(step.endAmps), 1e-6);
  const firstAmps = peakAmps(step.ampHours, step.stopS - step.startS, lastAmps);
  const anchor = step.groupIndexes[0]!;
  const span = socAfter[anchor]! - socBefore[anchor]!;
  const partOf = (state: ModuleState): number => (span === 0 ? 1 : (state.soc[anchor]! - socBefore[anchor]!) / span);
  const scaleOf = (drive: Drive): number => (drive.maxAmps === null ? 1 : drive.maxAmps / firstAmps);
  const ampsAtPart = (part: number): number => Math.max(lastAmps * 0.2, firstAmps + (lastAmps - firstAmps) * part);
  const stateAt = (part: number, s: number, over: number[]): ModuleState => ({
    s,
    soc: socBefore.map((from, group) => from + (socAfter[group]! - from) * part),
    over,
  });

  /** dq/dt = −(q-slope)·q + first: exponential approach, in closed form. */
  const forward = (state: ModuleState, drive: Drive, maxSeconds: number | null, onwards = false): Forward => {
    const scale = scaleOf(drive);
    const part = partOf(state);
    const amps = ampsAtPart(part) * scale;
    const endAmps = lastAmps * scale;
    const left = Math.max(0, 1 - part);
    const fall = ((firstAmps - lastAmps) * scale) / (3600 * step.ampHours);
    const toEndS = fall > 1e-12 ? Math.log(Math.max(amps / endAmps, 1)) / fall : (left * step.ampHours * 3600) / amps;
    const whole = left <= 0 && !onwards ? 0 : toEndS;
    const ended = !onwards && (maxSeconds === null || whole <= maxSeconds);
    const seconds = ended ? whole : (maxSeconds ?? whole);
    const nowAmps = fall > 1e-12 ? amps * Math.exp(-fall * seconds) : amps;
    const ampHours = fall > 1e-12 ? (amps - nowAmps) / (fall * 3600) : (amps * seconds) / 3600;
    const next = ended ? 1 : part + ampHours / step.ampHours;
    return {
      seconds,
      ended,
      taperAfterS: 0,
      ampHours: ended ? left * step.ampHours : ampHours,
      amps: sign * nowAmps,
      state: stateAt(next, state.s + seconds, overOf(nowAmps, state)),
    };
  };
  const overOf = (amps: number, state: ModuleState): number[] =>
    state.over.map((volts, group) =>
      step.kind !== 'pre-level' && step.groupIndexes.includes(group)
        ? sign * amps * model.groups[group]!.polarisationResistanceOhm
        : volts,
    );

  return {
    index,
    step,
    sign,
    setAmps: step.setAmps,
    trickleAmps: 0,
    touched: socBefore.map((_, group) => group),
    forward,
    ampsAt: (state, drive) => ampsAtPart(partOf(state)) * scaleOf(drive),
    moved: (state, fromAmps, toAmps, seconds) => {
      const ampHours = ((fromAmps + toAmps) / 2) * (seconds / 3600);
      const part = partOf(state) + (step.ampHours > 0 ? ampHours / step.ampHours : 1);
      return stateAt(part, state.s + seconds, overOf(toAmps, state));
    },
    clipVolts: (state, amps) =>
      step.groupIndexes.reduce(
        (sum, group) =>
          sum +
          voltsAtSoc(model.curve, state.soc[group]!) +
          state.over[group]! +
          sign * amps * model.groups[group]!.ohmicResistanceOhm,
        0,
      ),
    isNearEnd: () => true,
    atSetVolts: () => false,
    // The reading over the plan's amps at that charge, as amps at the start.
    driveInTaper: (state, amps) => ({
      maxAmps: (firstAmps * amps) / ampsAtPart(partOf(state)),
      setShiftVolts: 0,
      seenInTaper: true,
    }),
  };
}

/** First current of an exponential with a known end, charge and time: charge = (I₀ − I₁)/ln(I₀/I₁) · t. */
function peakAmps(ampHours: number, seconds: number, lastAmps: number): number {
  if (!(seconds > 0)) return lastAmps;
  const mean = (3600 * ampHours) / seconds;
  if (mean <= lastAmps * (1 + 1e-9)) return lastAmps;
  let low = mean;
  let high = mean * 2;
  const logMean = (first: number): number => (first - lastAmps) / Math.log(first / lastAmps);
  while (logMean(high) < mean) high *= 2;
  for (let pass = 0; pass < 60; pass += 1) {
    const middle = (low + high) / 2;
    if (logMean(middle) < mean) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
