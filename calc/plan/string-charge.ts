import { compileCurve, PIECE, type CompiledCurve } from '../curve/compiled-curve';
import type { OcvTable } from '../types';

/** Charge in series groups seen over the ampere-hours at the terminals. */
export interface StringCharge {
  curve: CompiledCurve;
  /** How many there are of each, */
  counts: readonly number[];
  /** where they stand, */
  soc: readonly number[];
  /** and how far one ampere-hour at the terminals moves them, signed by the direction. */
  socPerAmpHour: readonly number[];
  /** Piece of the curve in which each was found last: charge moves little between two looks. */
  pieces: number[];
  /** Where one ampere-hour moves all of them alike; else null. */
  cloud: Cloud | null;
  /** As of the last `bring`: summed rest voltage, V, and its slope, V per ampere-hour. */
  volts: number;
  slope: number;
}

/** Groups that move together: while one piece of the curve holds them all, their moments say what their sum is. */
interface Cloud {
  count: number;
  least: number;
  most: number;
  mean: number;
  /** Sums of the squares and cubes of what each is off the mean. */
  squares: number;
  cubes: number;
}

/** Groups that move alike are a cloud; of others those with equal state and step are merged. */
export function stringCharge(table: OcvTable, soc: readonly number[], socPerAmpHour: readonly number[]): StringCharge {
  const curve = compileCurve(table);
  const piece = curve.ofSoc.at(soc[0]!);
  const cloud = cloudOf(soc, socPerAmpHour);
  if (cloud !== null) {
    const pieces: number[] = [];
    const counts: number[] = [];
    for (let at = 0; at < soc.length; at += 1) {
      pieces.push(piece);
      counts.push(1);
    }
    return { curve, counts, soc, socPerAmpHour, pieces, cloud, volts: NaN, slope: NaN };
  }
  const counts: number[] = [];
  const own: number[] = [];
  const steps: number[] = [];
  for (let group = 0; group < soc.length; group += 1) {
    const at = soc[group]!;
    const step = socPerAmpHour[group]!;
    let known = 0;
    while (known < own.length && (own[known] !== at || steps[known] !== step)) known += 1;
    if (known < own.length) counts[known]! += 1;
    else {
      counts.push(1);
      own.push(at);
      steps.push(step);
    }
  }
  const pieces = own.map(() => piece);
  return { curve, counts, soc: own, socPerAmpHour: steps, pieces, cloud, volts: NaN, slope: NaN };
}

function cloudOf(soc: readonly number[], steps: readonly number[]): Cloud | null {
  const count = soc.length;
  let sum = 0;
  let least = Infinity;
  let most = -Infinity;
  for (let at = 0; at < count; at += 1) {
    if (steps[at] !== steps[0]) return null;
    sum += soc[at]!;
    least = Math.min(least, soc[at]!);
    most = Math.max(most, soc[at]!);
  }
  const mean = sum / count;
  let squares = 0;
  let cubes = 0;
  for (let at = 0; at < count; at += 1) {
    const off = soc[at]! - mean;
    squares += off * off;
    cubes += off * off * off;
  }
  return { count, least, most, mean, squares, cubes };
}

/** The piece of the curve that one of them is in at a state of charge. */
function pieceOf({ curve, pieces }: StringCharge, at: number, soc: number): number {
  const { knots } = curve;
  let piece = pieces[at]!;
  while (piece > 0 && soc < knots[piece - 1]!) piece -= 1;
  while (piece < knots.length && soc >= knots[piece]!) piece += 1;
  pieces[at] = piece;
  return piece;
}

/** Brings `volts` and `slope` to so many ampere-hours. */
function bring(string: StringCharge, ampHours: number): void {
  const { cloud, socPerAmpHour, curve } = string;
  if (cloud !== null) {
    const moved = socPerAmpHour[0]! * ampHours;
    const piece = pieceOf(string, 0, cloud.least + moved);
    if (piece === curve.knots.length || cloud.most + moved < curve.knots[piece]!) {
      const { pieces } = curve;
      const p = PIECE * piece;
      const x = cloud.mean + moved - pieces[p]!;
      const c1 = pieces[p + 2]!;
      const c2 = pieces[p + 3]!;
      const c3 = pieces[p + 4]!;
      string.volts =
        cloud.count * (pieces[p + 1]! + x * (c1 + x * (c2 + x * c3))) +
        (c2 + 3 * c3 * x) * cloud.squares +
        c3 * cloud.cubes;
      string.slope = socPerAmpHour[0]! * (cloud.count * (c1 + x * (2 * c2 + x * 3 * c3)) + 3 * c3 * cloud.squares);
      return;
    }
  }
  bringEach(string, ampHours);
}

function bringEach(string: StringCharge, ampHours: number): void {
  const { counts, soc, socPerAmpHour } = string;
  const { pieces } = string.curve;
  let volts = 0;
  let slope = 0;
  for (let at = 0; at < soc.length; at += 1) {
    const z = soc[at]! + socPerAmpHour[at]! * ampHours;
    const p = PIECE * pieceOf(string, at, z);
    const x = z - pieces[p]!;
    const c1 = pieces[p + 2]!;
    const c2 = pieces[p + 3]!;
    const c3 = pieces[p + 4]!;
    volts += counts[at]! * (pieces[p + 1]! + x * (c1 + x * (c2 + x * c3)));
    slope += counts[at]! * socPerAmpHour[at]! * (c1 + x * (2 * c2 + x * 3 * c3));
  }
  string.volts = volts;
  string.slope = slope;
}

/** Summed rest voltage after so many ampere-hours, V. */
export function stringVolts(string: StringCharge, ampHours: number): number {
  bring(string, ampHours);
  return string.volts;
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
  const whole = wholeAmpHours(string);
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
    bring(string, at);
    const off = string.volts - volts;
    if (off * sign > 0) high = at;
    else low = at;
    let next = at - off / string.slope;
    if (!(next > low && next < high)) next = (low + high) / 2;
    if (Math.abs(next - at) < 1e-12 * whole) return next;
    at = next;
  }
  return at;
}

/** Ampere-hours that take the quickest group from empty to full. */
function wholeAmpHours({ socPerAmpHour }: StringCharge): number {
  let quickest = 0;
  for (let at = 0; at < socPerAmpHour.length; at += 1) quickest = Math.max(quickest, Math.abs(socPerAmpHour[at]!));
  return 1 / quickest;
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
