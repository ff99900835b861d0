import { scaleLinear } from 'd3-scale';
import { fromZero } from './axis-steps';

export interface WaitBar {
  key: string;
  /** Under the bar: 'wk 23'. */
  label: string;
  used: number;
  lost: number;
  /** The present one: its label is bold. */
  present?: boolean;
}

export interface Rectangle {
  x: number;
  y: number;
  width: number;
  height: number;
}

export interface BarDrawing {
  height: number;
  left: number;
  lines: { y: number; text: string }[];
  bars: {
    bar: WaitBar;
    used: Rectangle;
    lost: Rectangle;
    centre: number;
    /** Where the figures stand; null where they find no room. */
    usedTextY: number | null;
    lostTextY: number | null;
  }[];
}

const left = 34;
const lead = 10;
/** A figure of 18 px needs this much bar. */
const figureHeight = 26;
const figureWidth = 22;
const n = (value: number) => Math.round(value * 100) / 100;

/** Stacked bars from 0: used solid below, lost above it. Width of bar and gap 2 : 1, bars at most 44 px. */
export function layoutBars(bars: readonly WaitBar[], width: number, height: number): BarDrawing {
  const { top, lines } = fromZero(Math.max(1, ...bars.map((bar) => bar.used + bar.lost)));
  const y = scaleLinear().domain([0, top]).range([height, 0]);
  const pitch = (width - left - lead) / Math.max(1, bars.length);
  const barWidth = Math.min(44, (pitch * 2) / 3);
  return {
    height,
    left,
    lines: lines.map((line) => ({ y: n(y(line)), text: String(line) })),
    bars: bars.map((bar, index) => {
      const x = left + lead + index * pitch + (pitch - barWidth) / 2;
      const [usedHeight, lostHeight] = [height - y(bar.used), height - y(bar.lost)];
      const wide = barWidth >= figureWidth;
      return {
        bar,
        used: { x: n(x), y: n(height - usedHeight), width: n(barWidth), height: n(usedHeight) },
        lost: {
          x: n(x + 0.75),
          y: n(height - usedHeight - lostHeight),
          width: n(barWidth - 1.5),
          height: n(Math.max(0, lostHeight - 2)),
        },
        centre: n(x + barWidth / 2),
        usedTextY: wide && usedHeight >= figureHeight ? n(height - usedHeight + 21) : null,
        lostTextY: wide && bar.lost > 0 ? n(height - usedHeight - lostHeight - 6) : null,
      };
    }),
  };
}
