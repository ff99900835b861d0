import { voltsAtSoc } from '../curve/ocv';
import { CalcInputError } from '../errors';
import type { OcvTable } from '../types';

/** A string of equal groups on one channel. */
export interface RunInput {
  curve: OcvTable;
  /** Of one group, Ah. */
  capacityAh: number;
  /** Long resistance of one group with its share of leads and links, ohm. */
  groupOhm: number;
  /** Most amps while charging and the volts of a group that are not passed; null: it cannot charge. */
  charge: { amps: number; capVolts: number } | null;
  /** Most amps while discharging and the volts of a group that are not passed; null: it cannot. */
  discharge: { amps: number; floorVolts: number } | null;
}

/** Grid of the state of charge: of a step of 0.25 % the error is far under a minute. */
const STEPS = 400;
/** Where the cap lets less than this share of the channel's amps through, the channel does not come. */
const LEAST_SHARE = 0.02;

/**
 * Minutes of current between two states of charge, by the quasi-steady current at each: what the channel gives, or what
 * the cap still lets through, I = min(I₀, (V − U(s))/R); the time is C ∫ ds/I. Overvoltages that build up over minutes are
 * taken as there from the start: of charges of hours that is little. Once asked for, a stretch costs two look-ups.
 *
 * @returns (from, to) → minutes; null: the channel cannot bring it there
 * @throws CalcInputError for a capacity or amps that are not above 0, or a resistance below 0
 */
export function runMinutes(input: RunInput): (fromSoc: number, toSoc: number) => number | null {
  const { curve, capacityAh, groupOhm, charge, discharge } = input;
  if (!(capacityAh > 0)) throw new CalcInputError('capacityAh', capacityAh, 'a number above 0');
  if (!(groupOhm >= 0)) throw new CalcInputError('groupOhm', groupOhm, '0 or more');
  for (const side of [charge, discharge])
    if (side && !(side.amps > 0)) throw new CalcInputError('amps', side.amps, 'a number above 0');
  /** Minutes from an end of the grid up to each of its points; by the amps at the n-th of them. */
  const sums = (most: number, ampsAt: (place: number) => number) => {
    const least = most * LEAST_SHARE;
    const upTo = new Float64Array(STEPS + 1);
    let before = ampsAt(0);
    for (let at = 1; at <= STEPS; at += 1) {
      const amps = ampsAt(at);
      const slow = Math.min(before, amps);
      const hours = slow < least ? Infinity : ((1 / before + 1 / amps) / 2) * (capacityAh / STEPS);
      upTo[at] = upTo[at - 1]! + hours * 60;
      before = amps;
    }
    return upTo;
  };
  const through = (over: number) => (groupOhm > 0 ? over / groupOhm : over > 0 ? Infinity : 0);
  const volts = (place: number) => voltsAtSoc(curve, place / STEPS);
  const up =
    charge && sums(charge.amps, (at) => Math.min(charge.amps, Math.max(0, through(charge.capVolts - volts(at)))));
  // Going down is counted from full.
  const down =
    discharge &&
    sums(discharge.amps, (at) =>
      Math.min(discharge.amps, Math.max(0, through(volts(STEPS - at) - discharge.floorVolts))),
    );
  return (fromSoc, toSoc) => {
    const [from, to] = [inside(fromSoc), inside(toSoc)];
    if (from === to) return 0;
    const table = to > from ? up : down;
    if (!table) return null;
    const minutes = to > from ? read(table, to) - read(table, from) : read(table, 1 - to) - read(table, 1 - from);
    return Number.isFinite(minutes) ? minutes : null;
  };
}

const inside = (soc: number): number => Math.min(1, Math.max(0, soc));

function read(upTo: Float64Array, soc: number): number {
  const at = Math.floor(soc * STEPS);
  const low = upTo[at]!;
  const part = soc * STEPS - at;
  return part === 0 || at >= STEPS ? low : low + (upTo[at + 1]! - low) * part;
}
