import { scaleLinear } from 'd3-scale';
import type { ShelfDto } from '@/shared/contract/waits-replay';
import { fromZero, voltLines } from '../charts/axis-steps';
import { fixed } from '../format/number';

const left = 34;
/** Room over the line for the words at its marks, px. */
const head = 22;

export interface ShelfDrawing {
  left: number;
  lines: { y: number; text: string }[];
  ticks: { x: number; text: string }[];
  path: string;
  best: { x: number; y: number };
  /** Null: no spare is on the shelf, or from there no target is in reach. */
  now: { x: number; y: number } | null;
}

const n = (value: number) => Math.round(value * 100) / 100;

/** Minutes on the charger against shelf volts: from 0 up, over the volts of the curve and of the present stock. */
export function layoutShelf({ curve, best, now }: ShelfDto, width: number, height: number): ShelfDrawing {
  const reached = now?.meanMinutes == null ? null : { volts: now.volts, meanMinutes: now.meanMinutes };
  const points = reached ? [...curve, reached] : curve;
  const volts = points.map((point) => point.volts);
  const [low, high] = [Math.min(...volts), Math.max(...volts)];
  const { top, lines } = fromZero(Math.max(1, ...points.map(({ meanMinutes }) => meanMinutes)));
  const x = scaleLinear()
    .domain(low === high ? [low - 0.05, high + 0.05] : [low, high])
    .range([left + 8, width - 12]);
  const y = scaleLinear().domain([0, top]).range([height, head]);
  const at = (point: { volts: number; meanMinutes: number }) => ({ x: n(x(point.volts)), y: n(y(point.meanMinutes)) });
  return {
    left,
    lines: lines.map((line) => ({ y: n(y(line)), text: String(line) })),
    ticks: voltLines(low, high).map((line) => ({ x: n(x(line)), text: fixed(line, 2) })),
    path: curve.map((point, i) => `${i === 0 ? 'M' : 'L'}${at(point).x} ${at(point).y}`).join(''),
    best: at(best),
    now: reached && at(reached),
  };
}
