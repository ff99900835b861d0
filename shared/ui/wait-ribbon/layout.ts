import type { Band, Segment } from '@/calc/plan-types';
import type { ColorRole } from '../theme/tokens';
import { combSlats } from './comb';

export interface LookIn {
  s: number;
  state: 'done' | 'next' | 'later';
}

export interface RibbonInput {
  segments: readonly Segment[];
  /** Left and right end of the axis, s, on the clock of the segments. */
  fromS: number;
  toS: number;
  /** px */
  width: number;
  height: number;
  /** Room above and below the silhouette. */
  padTop?: number;
  padBottom?: number;
  nowS?: number | null;
  band?: Band | null;
  lookIns?: readonly LookIn[];
  /** A discharge hangs from its line. */
  hanging?: boolean;
  /** px between the slats of the comb; 5, on the wall 8. */
  slat?: number;
  /** Everything from here on is held: hatched. */
  heldFromS?: number | null;
  /** The charge was stopped here: what would have come is not drawn. */
  stoppedAtS?: number | null;
}

export interface SegmentShape {
  d: string;
  /** Solid when done. */
  color: ColorRole;
  /** Filled with it while it is to come. */
  tint: ColorRole;
}

export interface Peg {
  x: number;
  y: number;
  r: number;
  filled: boolean;
  stem: string;
}

export interface RibbonDrawing {
  width: number;
  height: number;
  /** The line the silhouette stands on, or hangs from. */
  lineY: number;
  shapes: SegmentShape[];
  queues: string[];
  /** px of the silhouette that are done; null without a now. */
  doneWidth: number | null;
  slats: string[];
  slatWidth: number;
  likely: { slat: string; cap: string } | null;
  pegs: Peg[];
  now: { x: number; stem: string; foot: string; hollow: { post: string; foot: string } } | null;
  /** It runs off the axis and ends in two slanted strokes. */
  overrun: { halo: string; strokes: string } | null;
  hatch: { d: string; clip: string } | null;
  stop: string | null;
}

const n = (value: number) => Math.round(value * 100) / 100;
const restHeight = 0.24;
const handsHeight = 0.5;
const taperSteps = 12;

const colors: Partial<Record<Segment['kind'], { color: ColorRole; tint: ColorRole }>> = {
  cc: { color: 'charging', tint: 'chargingTint' },
  taper: { color: 'tapering', tint: 'taperingTint' },
  rest: { color: 'resting', tint: 'restingTint' },
  hands: { color: 'ink3', tint: 'well' },
};

/** The falling current of a taper, 1 at its begin, the rest's height at its end. */
const taperHeight = (share: number) =>
  restHeight + ((1 - restHeight) * (Math.exp(-3 * share) - Math.exp(-3))) / (1 - Math.exp(-3));

/** Outline of one segment, or null for what has none of its own (queue, check). */
function outline(segment: Segment, toX: (s: number) => number, toY: (share: number) => number): string | null {
  const { kind, fromS, toS } = segment;
  const [left, right, line] = [n(toX(fromS)), n(toX(toS)), n(toY(0))];
  const block = (share: number) => `M${left} ${line}V${n(toY(share))}H${right}V${line}z`;
  if (kind === 'cc') return block(1);
  if (kind === 'rest') return block(restHeight);
  if (kind === 'hands') return block(handsHeight);
  if (kind !== 'taper') return null;
  let curve = `M${left} ${line}V${n(toY(1))}`;
  for (let i = 1; i <= taperSteps; i++) {
    const share = i / taperSteps;
    curve += `L${n(toX(fromS + (toS - fromS) * share))} ${n(toY(taperHeight(share)))}`;
  }
  return `${curve}V${line}z`;
}

const cutOff = (segments: readonly Segment[], at: number | null | undefined): Segment[] =>
  at == null ? [...segments] : segments.filter((s) => s.fromS < at).map((s) => (s.toS > at ? { ...s, toS: at } : s));

/** Every mark of a wait ribbon in px. Time runs left to right; the silhouette is the current. */
export function layoutRibbon(input: RibbonInput): RibbonDrawing {
  const { fromS, toS, width, height, padTop = 0, padBottom = 0, nowS = null, hanging = false, slat = 5 } = input;
  const { lookIns = [], heldFromS = null, stoppedAtS = null } = input;
  const band = stoppedAtS === null ? (input.band ?? null) : null;
  const toX = (s: number) => ((s - fromS) / (toS - fromS)) * width;
  const toTime = (x: number) => fromS + (x / width) * (toS - fromS);
  const toY = (share: number) => (hanging ? padTop + height * share : padTop + height * (1 - share));
  const total = height + padTop + padBottom;
  const line = toY(0);
  const segments = cutOff(input.segments, stoppedAtS);
  const end = band ? band.p90 : (segments.at(-1)?.toS ?? fromS);
  const over = end > toS + (toS - fromS) * 0.002;

  const shapes: SegmentShape[] = [];
  const queues: string[] = [];
  for (const segment of segments) {
    if (segment.kind === 'queue') {
      queues.push(`M${n(toX(segment.fromS))} ${n(toY(0.1))}H${n(toX(segment.toS))}`);
      continue;
    }
    const d = outline(segment, toX, toY);
    const look = colors[segment.kind];
    if (d && look) shapes.push({ d, ...look });
  }

  const showComb = band !== null && !over;
  const likelyX = band ? n(toX(band.p50)) : 0;
  const nowX = nowS === null ? null : n(toX(nowS));
  return {
    width,
    height: total,
    lineY: line,
    shapes,
    queues,
    doneWidth: nowX === null ? null : Math.max(0, nowX),
    slats: showComb
      ? combSlats(band, toX, toTime, slat).map(({ x, height: share }) => `M${n(x)} ${n(line)}V${n(toY(share))}`)
      : [],
    slatWidth: slat > 6 ? 3 : 2,
    likely: showComb
      ? {
          slat: `M${likelyX} ${n(line)}V${n(toY(1))}`,
          // The cap points at the slat's end: from above, and from below where the ribbon hangs.
          cap: `M${likelyX} ${n(toY(1)) + (hanging ? -1 : 1)}l-6 ${hanging ? 8 : -8}h12z`,
        }
      : null,
    pegs: lookIns.map(({ s, state }) => {
      const x = n(toX(s));
      return {
        x,
        y: padTop - 11,
        r: state === 'done' ? 4.5 : state === 'next' ? 5.5 : 4,
        filled: state === 'done',
        stem: `M${x} ${padTop - 8}V${padTop + height}`,
      };
    }),
    now:
      nowX === null
        ? null
        : {
            x: nowX,
            stem: `M${nowX} ${padTop - 4}V${total - padBottom + 5}`,
            foot: `M${nowX} ${total - padBottom + 3}l-5.5 8h11z`,
            hollow: {
              post: `M${n(nowX - 2.5)} ${padTop - 4}V${total - padBottom + 5}M${n(nowX + 2.5)} ${padTop - 4}V${total - padBottom + 5}M${n(nowX - 2.5)} ${padTop - 4}h5`,
              foot: `M${nowX} ${total - padBottom + 4}l-6.5 8.5h13z`,
            },
          },
    overrun: over
      ? hanging
        ? {
            halo: `M${n(width - 5)} ${n(line - 3)}l6 ${height + 6}`,
            strokes: `M${n(width - 12)} ${n(line - 1)}l6 ${height + 2}M${n(width - 5)} ${n(line - 1)}l6 ${height + 2}`,
          }
        : {
            halo: `M${n(width - 5)} ${n(line + 3)}l6 ${-(height + 6)}`,
            strokes: `M${n(width - 12)} ${n(line + 1)}l6 ${-(height + 2)}M${n(width - 5)} ${n(line + 1)}l6 ${-(height + 2)}`,
          }
      : null,
    hatch: heldFromS === null ? null : hatchFrom(n(toX(heldFromS)), width, padTop, height, shapes),
    stop: stoppedAtS === null ? null : `M${n(toX(stoppedAtS))} ${n(padTop)}V${n(padTop + height)}`,
  };
}

/** Slanted lines 7 px apart over everything from `x` on; drawn inside the silhouette only. */
function hatchFrom(x: number, width: number, top: number, height: number, shapes: readonly SegmentShape[]) {
  let d = '';
  for (let at = x - height; at < width; at += 7)
    d += `M${n(Math.max(at, x))} ${n(top + height - Math.max(0, x - at))}L${n(at + height)} ${top}`;
  return { d, clip: shapes.map((shape) => shape.d).join('') };
}
