/** Where the bars of the spread stand. Pure; px. */
import { fromZero } from '../charts/axis-steps';
import type { GridLine } from '../charts/grid';
import { fixed } from '../format/number';
import type { SpreadBar } from './prove-words';

/** Left of the bars, for the numbers of the axis; from one bar's middle to the next; a bar; what the notch needs. */
export const [axisWidth, leastPitch, barWidth, notchWidth] = [22, 52, 34, 10];
const mostPitch = 90;
/** The arrival stands apart by far: over so much of the others' highest its bar is cut. */
const overTop = 1.2;

export interface BarDrawing {
  bar: SpreadBar;
  x: number;
  /** Top of the bar. */
  y: number;
  /** It is higher than the picture: its top is broken. */
  cut: boolean;
  /** Ends of the whisker; null: it was read. */
  whisker: { low: number; high: number } | null;
}

export interface SpreadDrawing {
  lines: GridLine[];
  aimY: number;
  bars: BarDrawing[];
  /** Bars that found no room: of those read the ones between the first and the last, of those expected the last. */
  left: number;
}

/** The bars that there is room for: the first and the latest that were read, and what is expected next. */
function shown(bars: readonly SpreadBar[], room: number): SpreadBar[] {
  const read = bars.filter(({ at }) => at !== null);
  const expected = bars.filter(({ at }) => at === null);
  const next = expected.slice(0, Math.max(Math.min(2, expected.length), room - read.length));
  const kept = Math.max(2, room - next.length);
  const late = read.length <= kept ? read : [read[0]!, ...read.slice(1 - kept)];
  return [...late, ...next];
}

/** @param height of the bars, without the names under them */
export function layoutSpread(
  bars: readonly SpreadBar[],
  aimMillivolts: number,
  width: number,
  height: number,
): SpreadDrawing {
  const wide = width - axisWidth - notchWidth;
  const drawn = shown(bars, Math.max(3, Math.floor(wide / leastPitch)));
  const pitch = Math.min(mostPitch, wide / Math.max(1, drawn.length));
  // Everything but the arrival sets the scale, where there is anything else.
  const later = drawn.slice(1);
  const highest = Math.max(aimMillivolts, ...(later.length > 0 ? later : drawn).map(({ spread }) => spread.p90));
  const { top, lines } = fromZero(highest);
  const most = top * overTop;
  const yOf = (millivolts: number): number => height * (1 - Math.min(millivolts, most) / most);
  return {
    lines: lines.map((line) => ({ y: yOf(line), text: fixed(line, Number.isInteger(line) ? 0 : 1) })),
    aimY: yOf(aimMillivolts),
    bars: drawn.map((bar, place) => ({
      bar,
      x: axisWidth + pitch * (place + 0.5),
      y: yOf(bar.spread.p50),
      cut: bar.spread.p50 > most,
      whisker: bar.at === null ? { low: yOf(bar.spread.p10), high: yOf(bar.spread.p90) } : null,
    })),
    left: bars.length - drawn.length,
  };
}
