import type { BenchModel } from './bench-model';
import type { Stretch } from './bench-types';

/** So many cells the time line has, each with its own price. */
const CELLS = 240;

/** What channels cost in time: a price a second per kind of channel and cell, none after the last cell. */
export interface BenchPrices {
  cellS: number;
  cells: number;
  /** Per channel its kind: alike channels have one price. */
  kind: Int32Array;
  /** Per kind and cell: price, and seconds of its channels that nothing has taken. */
  price: Float64Array;
  capacityS: Float64Array;
  /** Per kind and cell border: the price of everything before it. */
  before: Float64Array;
}

/** Prices of 0 up to `horizonS`. */
export function benchPrices(model: BenchModel, taken: readonly Stretch[][], horizonS: number): BenchPrices {
  const cellS = horizonS / CELLS;
  const kind = kindsOf(model);
  const kinds = Math.max(0, ...kind) + 1;
  const capacityS = new Float64Array(kinds * CELLS);
  taken.forEach((list, channel) => {
    for (let cell = 0; cell < CELLS; cell += 1) {
      let free = cellS;
      for (const { fromS, toS } of list)
        free -= Math.max(0, Math.min(toS, (cell + 1) * cellS) - Math.max(fromS, cell * cellS));
      capacityS[kind[channel]! * CELLS + cell]! += Math.max(0, free);
    }
  });
  return {
    cellS,
    cells: CELLS,
    kind,
    price: new Float64Array(kinds * CELLS),
    capacityS,
    before: new Float64Array(kinds * (CELLS + 1)),
  };
}

/** Channels by which the same jobs are done in the same times are of one kind. Any parting gives a true bound. */
function kindsOf({ channels, source, firstAlternative, firstHeld, held, busy, guard }: BenchModel): Int32Array {
  const signs: string[] = Array.from({ length: channels }, () => '');
  for (let job = 0; job < source.length; job += 1)
    for (let way = firstAlternative[job]!; way < firstAlternative[job + 1]!; way += 1)
      for (let h = firstHeld[way]!; h < firstHeld[way + 1]!; h += 1)
        signs[held[h]!] += `${job}:${busy[way]}:${guard[way]}:${firstHeld[way + 1]! - firstHeld[way]!};`;
  const known = [...new Set(signs)];
  return Int32Array.from(signs, (sign) => known.indexOf(sign));
}

/** Sums the prices up again after a change. */
export function sumPrices({ cells, cellS, price, before }: BenchPrices): void {
  for (let kind = 0; kind * cells < price.length; kind += 1)
    for (let cell = 0; cell < cells; cell += 1)
      before[kind * (cells + 1) + cell + 1] = before[kind * (cells + 1) + cell]! + price[kind * cells + cell]! * cellS;
}

/** The price of a channel of a kind from now until an instant. */
function priceUntil({ cells, cellS, price, before }: BenchPrices, kind: number, atS: number): number {
  const cell = Math.floor(atS / cellS);
  if (cell >= cells) return before[kind * (cells + 1) + cells]!;
  return before[kind * (cells + 1) + cell]! + price[kind * cells + cell]! * (atS - cell * cellS);
}

/** Weighted tardiness of an alternative's job when it begins at `startS`, and the price of the channels it holds. */
export function pricedCost(model: BenchModel, prices: BenchPrices, job: number, way: number, startS: number): number {
  let cost = model.weight[job]! * Math.max(0, startS + model.guard[way]! - model.due[job]!);
  for (let h = model.firstHeld[way]!; h < model.firstHeld[way + 1]!; h += 1) {
    const kind = prices.kind[model.held[h]!]!;
    cost += priceUntil(prices, kind, startS + model.busy[way]!) - priceUntil(prices, kind, startS);
  }
  return cost;
}

/**
 * Per alternative the instants among which its least priced cost is for any prices: the cost is made of straight lines
 * that break where a start or an end crosses the border of a cell, at the due time, and at the ends of windows. None for
 * an alternative that costs the same as one before it at any prices.
 */
export function breakpoints(model: BenchModel, prices: BenchPrices): Float64Array[] {
  const { cells, cellS } = prices;
  const lists: Float64Array[] = [];
  const seen = new Set<string>();
  for (let job = 0; job < model.source.length; job += 1)
    for (let way = model.firstAlternative[job]!; way < model.firstAlternative[job + 1]!; way += 1) {
      const at = new Set<number>();
      const kinds = [...model.held.subarray(model.firstHeld[way]!, model.firstHeld[way + 1]!)].map(
        (h) => prices.kind[h]!,
      );
      const windows = range(model.firstWindow[way]!, model.firstWindow[way + 1]!);
      const sign = [job, ...kinds.sort((a, b) => a - b), model.busy[way], model.guard[way], 'from'];
      for (const k of windows) sign.push(model.windowFrom[k]!, model.windowTo[k]!);
      if (seen.has(sign.join())) {
        lists.push(new Float64Array());
        continue;
      }
      seen.add(sign.join());
      const add = (start: number) => {
        if (windows.some((k) => model.windowFrom[k]! <= start && start <= model.windowTo[k]!)) at.add(start);
      };
      for (let border = 0; border <= cells; border += 1) {
        add(border * cellS);
        add(border * cellS - model.busy[way]!);
      }
      add(model.due[job]! - model.guard[way]!);
      for (const k of windows) {
        at.add(model.windowFrom[k]!);
        if (model.windowTo[k]! < Infinity) at.add(model.windowTo[k]!);
      }
      lists.push(Float64Array.from(at).sort());
    }
  return lists;
}

const range = (from: number, to: number): number[] => Array.from({ length: to - from }, (_, k) => from + k);
