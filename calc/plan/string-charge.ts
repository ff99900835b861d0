import { compileCurve, PIECE, type CompiledCurve } from '../curve/compiled-curve';
import type { OcvTable } from '../types';

/** Charge in series groups seen over the ampere-hours at the terminals; groups that behave alike are one. */
export interface StringCharge {
  curve: CompiledCurve;
  /** How many there are of each, */
  counts: number[];
  /** where they stand, */
  soc: number[];
  /** and how far one ampere-hour at the terminals moves them, signed by the direction. */
  socPerAmpHour: number[];
  /** Piece of the curve in which each was found last: charge moves little between two looks. */
  pieces: number[];
}

/** Merges groups with equal state and step, so that a module of twelve like groups costs one. */
export function stringCharge(table: OcvTable, soc: readonly number[], socPerAmpHour: readonly number[]): StringCharge {
  const curve = compileCurve(table);
  const string: StringCharge = { curve, counts: [], soc: [], socPerAmpHour: [], pieces: [] };
  for (let group = 0; group < soc.length; group += 1) {
    const at = soc[group]!;
    const step = socPerAmpHour[group]!;
    let known = 0;
    while (known < string.soc.length && (string.soc[known] !== at || string.socPerAmpHour[known] !== step)) known += 1;
    if (known < string.soc.length) string.counts[known]! += 1;
    else {
      string.counts.push(1);
      string.soc.push(at);
      string.socPerAmpHour.push(step);
      string.pieces.push(curve.ofSoc.at(at));
    }
  }
  return string;
}

/** The piece of the curve that one of them is in at a state of charge. */
function pieceOf({ curve, pieces }: StringCharge, at: number, soc: number): number {
  const { knots } = curve;
  let piece = pieces[at]!;
  while (piece > 0 && soc < knots[piece - 1]!) piece -= 1;
  while (piece < knots.length && soc >= knots[piece]!) piece += 1;
  pieces[at] = piece;
  return PIECE * piece;
}

/** Summed rest voltage after so many ampere-hours, V. */
export function stringVolts(string: StringCharge, ampHours: number): number {
  const { counts, soc, socPerAmpHour } = string;
  const { pieces } = string.curve;
  let sum = 0;
  for (let at = 0; at < soc.length; at += 1) {
    const z = soc[at]! + socPerAmpHour[at]! * ampHours;
    const p = pieceOf(string, at, z);
    const x = z - pieces[p]!;
    sum += counts[at]! * (pieces[p + 1]! + x * (pieces[p + 2]! + x * (pieces[p + 3]! + x * pieces[p + 4]!)));
  }
  return sum;
}

/** Its slope, V per ampere-hour. */
function stringSlope(string: StringCharge, ampHours: number): number {
  const { counts, soc, socPerAmpHour } = string;
  const { pieces } = string.curve;
  let slope = 0;
  for (let at = 0; at < soc.length; at += 1) {
    const z = soc[at]! + socPerAmpHour[at]! * ampHours;
    const p = pieceOf(string, at, z);
    const x = z - pieces[p]!;
    slope += counts[at]! * socPerAmpHour[at]! * (pieces[p + 2]! + x * (2 * pieces[p + 3]! + x * 3 * pieces[p + 4]!));
  }
  return slope;
}

/**
 * Ampere-hours at the terminals until the summed rest voltage is `volts`; 0 where it is there already, or past it in the
 * string's own direction.
 *
 * Newton inside a bracket: the sum is monotone in the ampere-hours.
 */
export function ampHoursToVolts(string: StringCharge, volts: number): number {
  const sign = Math.sign(string.socPerAmpHour[0]!);
  let low = 0;
  let atLow = (stringVolts(string, 0) - volts) * sign;
  if (atLow >= 0) return 0;
  const whole = 1 / Math.max(...string.socPerAmpHour.map(Math.abs));
  let high = whole / 4;
  let atHigh = (stringVolts(string, high) - volts) * sign;
  while (atHigh < 0) {
    low = high;
    atLow = atHigh;
    high *= 2;
    if (high > 1e4 * whole) return ampHoursToCurveEnd(string);
    atHigh = (stringVolts(string, high) - volts) * sign;
  }
  let at = low + ((high - low) * -atLow) / (atHigh - atLow);
  for (let pass = 0; pass < 60; pass += 1) {
    const off = stringVolts(string, at) - volts;
    if (off * sign > 0) high = at;
    else low = at;
    let next = at - off / stringSlope(string, at);
    if (!(next > low && next < high)) next = (low + high) / 2;
    if (Math.abs(next - at) < 1e-12 * whole) return next;
    at = next;
  }
  return at;
}

/** Ampere-hours until the last group is at the end of its curve: as far as a curve that is level there can tell. */
function ampHoursToCurveEnd({ curve, soc, socPerAmpHour }: StringCharge): number {
  const end = socPerAmpHour[0]! > 0 ? curve.knots[curve.knots.length - 1]! : curve.knots[0]!;
  return Math.max(0, ...soc.map((at, group) => (end - at) / socPerAmpHour[group]!));
}

/** Ampere-hours until the first group is at `targetSoc`; below 0 where one is past it. */
export function ampHoursToFirst({ soc, socPerAmpHour }: StringCharge, targetSoc: number): number {
  let least = Infinity;
  for (let at = 0; at < soc.length; at += 1) least = Math.min(least, (targetSoc - soc[at]!) / socPerAmpHour[at]!);
  return least;
}
