import { chemistryParameters, socAtVolts, voltsAtSoc, type ChemistryParameters, type OcvTable } from '@/calc';
import type { chemistryIds } from '@/shared/contract/equipment';
import { voltLines, fromZero } from '../charts/axis-steps';

export type Chemistry = (typeof chemistryIds)[number];

/** What of the type is drawn; null where it is not typed, or not yet a number. Volts of one group, Ah of one group. */
export interface CurveInput {
  chemistry: Chemistry;
  ratedAh: number | null;
  chargeLimitVolts: number | null;
  dischargeLimitVolts: number | null;
  floorVolts: number | null;
  shelfVolts: number | null;
  /** The type's own curve, or a published one that was chosen; null or left out: the chemistry's. */
  curve?: OcvTable | null;
}

/** The chemistry's usual values with the curve that is drawn. */
export function drawnParameters({ chemistry, curve }: Pick<CurveInput, 'chemistry' | 'curve'>): ChemistryParameters {
  const usual = chemistryParameters(chemistry);
  return curve ? { ...usual, curve } : usual;
}

/** The volts that `around` is worth, V to both sides together: 5 mV. */
const WORTH_VOLTS = 0.005;
const TENTHS = Array.from({ length: 10 }, (_, i) => i / 10);

/**
 * Charge between 2.5 mV under and 2.5 mV over the rest voltage at `soc`, as a share of the capacity. Ends of the curve
 * cut it off.
 */
export function worthShare({ curve }: Pick<ChemistryParameters, 'curve'>, soc: number): number {
  const [low, high] = [voltsAtSoc(curve, 0), voltsAtSoc(curve, 1)];
  const volts = voltsAtSoc(curve, soc);
  const at = (v: number) => socAtVolts(curve, Math.min(high, Math.max(low, v)));
  return at(volts + WORTH_VOLTS / 2) - at(volts - WORTH_VOLTS / 2);
}

export interface Worth {
  fromSoc: number;
  toSoc: number;
  /** Rest voltage in the middle of this tenth. */
  volts: number;
  /** Share of the capacity that 5 mV around there is. */
  share: number;
}

/** What 5 mV is worth in the middle of each tenth of the charge. */
export function worthByTenth(parameters: Pick<ChemistryParameters, 'curve'>): Worth[] {
  return TENTHS.map((fromSoc) => ({
    fromSoc,
    toSoc: fromSoc + 0.1,
    volts: voltsAtSoc(parameters.curve, fromSoc + 0.05),
    share: worthShare(parameters, fromSoc + 0.05),
  }));
}

/** The tenths side by side that are worth nearly as much as the one worth most: there a voltage says least. */
export function flattest(worths: readonly Worth[]): { fromSoc: number; toSoc: number } {
  const most = worths.reduce((best, each, i) => (each.share > (worths[best]?.share ?? 0) ? i : best), 0);
  const near = (i: number) => (worths[i]?.share ?? 0) >= 0.85 * (worths[most]?.share ?? 0);
  let [from, to] = [most, most];
  while (from > 0 && near(from - 1)) from -= 1;
  while (to < worths.length - 1 && near(to + 1)) to += 1;
  return { fromSoc: worths[from]?.fromSoc ?? 0, toSoc: worths[to]?.toSoc ?? 1 };
}

export interface CurveDrawing {
  left: number;
  width: number;
  voltsHeight: number;
  /** Path of the curve; the table's own points where they are few enough to be told apart. */
  curve: string;
  dots: { x: number; y: number }[];
  lines: { y: number; text: string }[];
  flat: { x: number; width: number };
  limits: { key: string; y: number; text: string; below: boolean }[];
  /** Shelf voltage: across to the curve, then down to its charge. */
  shelf: { y: number; x: number; text: string; soc: number } | null;
  bars: { x: number; width: number; y: number; height: number; text: string; centre: number }[];
  barLines: { y: number; text: string }[];
  barsHeight: number;
  toX: (soc: number) => number;
}

/** Lays out curve and bars. Pixels; the bars have their own origin. */
export function layoutCurve(input: CurveInput, width: number, voltsHeight: number, barsHeight: number): CurveDrawing {
  const parameters = drawnParameters(input);
  const { curve } = parameters;
  const left = 46;
  const inside = Math.max(1, width - left - 6);
  const toX = (soc: number) => left + soc * inside;
  const drawn = [
    curve.volts[0] ?? 0,
    curve.volts.at(-1) ?? 1,
    ...[input.chargeLimitVolts, input.dischargeLimitVolts, input.floorVolts].filter(
      (v) => v !== null && v > 0 && v < 6,
    ),
  ].map(Number);
  const span = Math.max(...drawn) - Math.min(...drawn);
  const [low, high] = [Math.min(...drawn) - 0.08 * span, Math.max(...drawn) + 0.08 * span];
  const toY = (volts: number) => voltsHeight - ((volts - low) / (high - low)) * voltsHeight;
  const point = (soc: number, volts: number) => `${toX(soc).toFixed(1)} ${toY(volts).toFixed(1)}`;
  // Only where there are points: what lies beyond is nobody's measurement.
  const [first, last] = [curve.soc[0] ?? 0, curve.soc.at(-1) ?? 1];
  const path = Array.from({ length: 201 }, (_, i) => first + (i / 200) * (last - first)).map((soc) =>
    point(soc, voltsAtSoc(curve, soc)),
  );
  const few = curve.soc.length <= 25;
  const worths = worthByTenth(parameters);
  const area = flattest(worths);
  const ah = input.ratedAh ?? null;
  const values = worths.map(({ share }) => (ah === null ? share * 100 : share * ah));
  const axis = fromZero(Math.max(...values), 2);
  const limit = (key: string, volts: number | null, words: string, below: boolean) =>
    volts === null || volts <= 0 || volts >= 6
      ? []
      : [{ key, y: toY(volts), text: `${words} ${volts.toFixed(2)} V`, below }];
  const shelf = input.shelfVolts;
  const shelfDrawn = shelf !== null && shelf > (curve.volts[0] ?? 0) && shelf < (curve.volts.at(-1) ?? 0);
  const shelfSoc = shelfDrawn ? socAtVolts(curve, shelf) : 0;
  return {
    left,
    width,
    voltsHeight,
    toX,
    curve: `M${path.join('L')}`,
    dots: few ? curve.soc.map((soc, i) => ({ x: toX(soc), y: toY(curve.volts[i] ?? 0) })) : [],
    lines: voltLines(low, high).map((volts) => ({ y: toY(volts), text: volts.toFixed(1) })),
    flat: { x: toX(area.fromSoc), width: toX(area.toSoc) - toX(area.fromSoc) },
    limits: [
      ...limit('charge', input.chargeLimitVolts, 'charge to at most', false),
      ...limit('discharge', input.dischargeLimitVolts, 'not below', false),
      ...limit('floor', input.floorVolts, 'floor', true),
    ],
    shelf: shelfDrawn ? { y: toY(shelf), x: toX(shelfSoc), text: `shelf ${shelf.toFixed(2)} V`, soc: shelfSoc } : null,
    bars: worths.map(({ fromSoc, toSoc }, i) => {
      const value = values[i] ?? 0;
      const height = (value / axis.top) * barsHeight;
      return {
        x: toX(fromSoc) + 1,
        width: Math.max(1, toX(toSoc) - toX(fromSoc) - 2),
        y: barsHeight - height,
        height,
        centre: (toX(fromSoc) + toX(toSoc)) / 2,
        text: value >= 10 ? value.toFixed(0) : value >= 1 ? value.toFixed(1) : value.toFixed(2),
      };
    }),
    barLines: axis.lines.map((value) => ({ y: barsHeight - (value / axis.top) * barsHeight, text: String(value) })),
    barsHeight,
  };
}

/** Where a voltage says most and least of the charge, above the steep foot; for the sentence under the picture. */
export function extremes(parameters: Pick<ChemistryParameters, 'curve'>): { flat: Worth; steep: Worth } {
  const upper = worthByTenth(parameters).filter(({ fromSoc }) => fromSoc >= 0.2);
  const by = (better: (a: number, b: number) => boolean) =>
    upper.reduce((best, each) => (better(each.share, best.share) ? each : best));
  return { flat: by((a, b) => a > b), steep: by((a, b) => a < b) };
}
