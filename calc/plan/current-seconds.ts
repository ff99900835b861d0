import { findRoot } from '../step/find-root';

/**
 * What limits the current of one sample, seen over the ampere-hours already moved: a chain of limits with one long
 * resistance (R0 + R1, links, leads) in place of the RC pair.
 */
export interface CurrentLaw {
  /** Summed open-circuit volts after so many ampere-hours at the terminals. */
  openVolts: (ampHours: number) => number;
  /** The ampere-hours at which that is so many volts, where it is known beforehand. */
  ampHoursTo?: (openVolts: number) => number;
  /** +1 charging, −1 discharging. */
  sign: 1 | -1;
  maxAmps: number;
  /** Null: no voltage limit (a load resistor). */
  setVolts: number | null;
  maxWatts: number | null;
  /** Long resistance of everything between the open-circuit voltage and the point where the limit is measured, ohm. */
  resistanceOhm: number;
  /** Resistor the current runs into besides, ohm; null: none. */
  loadOhm: number | null;
  /** Second open-circuit voltage at the other end of the resistor (a neighbour), falling or rising with the ampere-hours. */
  otherVolts?: (ampHours: number) => number;
  /** Below this the current counts as this, A: a sample that never ends is not asked for. */
  leastAmps: number;
}

/** Nodes over a stretch in which the current changes; with 16 a taper to a fiftieth is within 0.3 % of the limit. */
const NODES = 16;

/** The end of the constant current is found to within this share of the charge. */
const CLOSE_SHARE = 1e-8;

/** Amps after so many ampere-hours, positive in the law's own direction. */
export const ampsAfter = (law: CurrentLaw, ampHours: number): number =>
  Math.max(Math.min(law.maxAmps, limitedAmps(law, ampHours)), law.leastAmps);

/** Amps that everything but the source's own most would let through. */
function limitedAmps(law: CurrentLaw, ampHours: number): number {
  const open = law.openVolts(ampHours);
  const { sign, resistanceOhm: ohm } = law;
  let amps = Infinity;
  if (law.loadOhm !== null) {
    const difference = law.otherVolts === undefined ? open : (law.otherVolts(ampHours) - open) * sign;
    amps = Math.min(amps, difference / (ohm + law.loadOhm));
  }
  if (law.setVolts !== null) amps = Math.min(amps, ((law.setVolts - open) * sign) / ohm);
  if (law.maxWatts !== null) {
    const root = open * open + sign * 4 * ohm * law.maxWatts;
    if (root > 0) amps = Math.min(amps, (2 * law.maxWatts) / (open + Math.sqrt(root)));
  }
  return amps;
}

/**
 * Seconds in which `ampHours` pass: ∫ 3600 dQ / I(Q).
 *
 * Constant current is exact. Where the current changes, the stretch is cut into pieces that get finer towards the end, and
 * in each the current falls in proportion to the charge, for which the integral is 3600 ΔQ ln(I₁/I₂)/(I₁ − I₂).
 */
export function currentSeconds(law: CurrentLaw, ampHours: number): number {
  if (ampHours <= 0) return 0;
  const last = ampsAfter(law, ampHours);
  const first = ampsAfter(law, 0);
  if (first === last && last === law.maxAmps) return (3600 * ampHours) / last;
  const from = first === law.maxAmps ? endOfConstantCurrent(law, ampHours, last) : 0;
  let seconds = (3600 * from) / law.maxAmps;
  let before = from === 0 ? first : law.maxAmps;
  let at = from;
  for (let node = 1; node <= NODES; node += 1) {
    const left = 1 - node / NODES;
    const next = from + (ampHours - from) * (1 - left * left);
    const amps = node === NODES ? last : ampsAfter(law, next);
    seconds += (3600 * (next - at)) / meanAmps(before, amps);
    at = next;
    before = amps;
  }
  return seconds;
}

/** Logarithmic mean: exact where the current falls in proportion to the charge. */
function meanAmps(first: number, second: number): number {
  const ratio = first / second;
  if (Math.abs(ratio - 1) < 1e-4) return (first + second) / 2;
  return (first - second) / Math.log(ratio);
}

/** Ampere-hours at which the current begins to fall: the currents are monotone over a charge. */
function endOfConstantCurrent(law: CurrentLaw, ampHours: number, lastAmps: number): number {
  if (law.ampHoursTo !== undefined && law.setVolts !== null && law.maxWatts === null && law.loadOhm === null)
    return lastAmps === law.maxAmps
      ? ampHours
      : Math.min(ampHours, law.ampHoursTo(law.setVolts - law.sign * law.maxAmps * law.resistanceOhm));
  const over = (at: number): number => limitedAmps(law, at) - law.maxAmps;
  const last = over(ampHours);
  return last >= 0 ? ampHours : findRoot(over, 0, over(0), ampHours, last, CLOSE_SHARE * ampHours);
}
