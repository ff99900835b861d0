import { scaleLinear } from 'd3-scale';
import type { Band, Segment, TracePlanPoint } from '@/calc/plan-types';
import { pointMarks, type LocaleMarks } from '../format/marks';
import { fixed } from '../format/number';
import type { ColorRole } from '../theme/tokens';
import { combSlats } from '../wait-ribbon/comb';
import { fromZero, lineDecimals, voltLines } from './axis-steps';
import type { GridLine } from './grid';

export interface PictureReading {
  s: number;
  /** Mean of the groups at the clips, V. */
  volts?: number | null;
  amps?: number | null;
  odd?: boolean;
}

export interface PictureInput {
  trace: readonly TracePlanPoint[];
  segments: readonly Segment[];
  /** When it will be ready, s from the begin of the trace. */
  band: Band;
  targetVolts: number;
  readings?: readonly PictureReading[];
  /** Rest volts at the 10th and 90th percentile; without it the likely course is stretched to the band's ends. */
  restBand?: readonly { s: number; low: number; high: number }[];
  /** px */
  width: number;
  voltsHeight: number;
  ampsHeight: number;
  /** Decimal mark of the axis. */
  marks?: LocaleMarks;
}

export interface PictureDrawing {
  width: number;
  height: number;
  left: number;
  /** Foot of the amps panel. */
  baseY: number;
  spanS: number;
  toX: (s: number) => number;
  voltLines: GridLine[];
  ampLines: GridLine[];
  bandArea: string;
  clipLine: string;
  restLine: string;
  targetY: number;
  targetTab: string;
  silhouette: { d: string; color: ColorRole }[];
  slats: string[];
  likely: string;
  dots: { x: number; y: number; odd: boolean }[];
}

const left = 44;
const between = 20;
const beyondVolts = 0.05;
const slat = 5;
const n = (value: number) => Math.round(value * 100) / 100;

/** The trace with points added at both ends of a stretch, so that the silhouette is cut exactly there. */
function within(trace: readonly TracePlanPoint[], fromS: number, toS: number): { s: number; amps: number }[] {
  const inside = trace.filter((point) => point.s > fromS && point.s < toS);
  const at = (s: number) => {
    const after = trace.findIndex((point) => point.s >= s);
    const b = trace[after];
    const a = trace[after - 1];
    if (!b) return { s, amps: trace.at(-1)?.amps ?? 0 };
    if (!a || b.s === a.s) return { s, amps: b.amps };
    return { s, amps: a.amps + ((s - a.s) / (b.s - a.s)) * (b.amps - a.amps) };
  };
  // The current jumps at the ends of a step: the nearest point inside tells more than one across the jump.
  const first = inside[0] ? { s: fromS, amps: inside[0].amps } : at(fromS);
  const last = inside.at(-1);
  return [first, ...inside, last ? { s: toS, amps: last.amps } : at(toS)];
}

const path = (points: readonly (readonly [number, number])[]) =>
  points.map(([x, y], i) => `${i ? 'L' : 'M'}${n(x)} ${n(y)}`).join('');

/** One dot a pixel: a log has more readings than the picture has room for. An odd one is never covered. */
function apart(dots: PictureDrawing['dots']): PictureDrawing['dots'] {
  const there = new Map<string, PictureDrawing['dots'][number]>();
  for (const dot of dots) {
    const pixel = `${Math.round(dot.x)} ${Math.round(dot.y)}`;
    const before = there.get(pixel);
    if (before === undefined || (dot.odd && !before.odd)) there.set(pixel, dot);
  }
  return [...there.values()];
}

/** Volts above (clips solid, rest dashed, band as tint, target as notch line), amps below with the comb. */
export function layoutPicture(input: PictureInput): PictureDrawing {
  const { trace, segments, band, targetVolts, readings = [], width, voltsHeight, ampsHeight } = input;
  const { marks = pointMarks } = input;
  const spanS = Math.max(band.p90, segments.at(-1)?.toS ?? 0, ...readings.map((reading) => reading.s)) + 600;
  const x = scaleLinear().domain([0, spanS]).range([left, width]).clamp(true);
  const seen = readings.flatMap((reading) => (reading.volts == null ? [] : [reading.volts]));
  const all = [...trace.flatMap((point) => [point.clipVolts, point.restVolts]), ...seen, targetVolts];
  const [low, high] = [Math.min(...all) - beyondVolts, Math.max(...all) + beyondVolts];
  const y = scaleLinear().domain([low, high]).range([voltsHeight, 0]).clamp(true);
  const drawn = [...trace.map((point) => point.amps), ...readings.map((reading) => reading.amps ?? 0)].map(Math.abs);
  const amps = fromZero(Math.max(...drawn), 2);
  const baseY = voltsHeight + between + ampsHeight;
  const yAmps = scaleLinear()
    .domain([0, amps.top])
    .range([baseY, voltsHeight + between])
    .clamp(true);

  const stretched = (share: number) => trace.map((point) => [x(point.s * share), y(point.restVolts)] as const);
  const area = input.restBand
    ? [
        ...input.restBand.map((point) => [x(point.s), y(point.high)] as const),
        ...[...input.restBand].reverse().map((point) => [x(point.s), y(point.low)] as const),
      ]
    : [...stretched(band.p10 / band.p50), ...stretched(band.p90 / band.p50).reverse()];

  const silhouette = segments.flatMap(({ kind, fromS, toS }): { d: string; color: ColorRole }[] => {
    const [a, b] = [n(x(fromS)), n(x(toS))];
    if (kind === 'rest') return [{ d: `M${a} ${n(baseY - 4)}H${b}V${baseY}H${a}z`, color: 'resting' }];
    if (kind !== 'cc' && kind !== 'taper') return [];
    const top = within(trace, fromS, toS).map((point) => [x(point.s), yAmps(Math.abs(point.amps))] as const);
    return [
      { d: `M${a} ${baseY}${path(top).replace('M', 'L')}V${baseY}z`, color: kind === 'cc' ? 'charging' : 'tapering' },
    ];
  });

  const volts = voltLines(low, high);
  const ampDecimals = lineDecimals(amps.lines);
  const targetY = n(y(targetVolts));
  return {
    width,
    height: baseY,
    left,
    baseY,
    spanS,
    toX: (s) => n(x(s)),
    voltLines: volts.map((line) => ({ y: n(y(line)), text: fixed(line, Math.max(1, lineDecimals(volts)), marks) })),
    ampLines: amps.lines.map((line) => ({ y: n(yAmps(line)), text: fixed(line, ampDecimals, marks) })),
    bandArea: `${path(area)}z`,
    clipLine: path(trace.map((point) => [x(point.s), y(point.clipVolts)] as const)),
    restLine: path(trace.map((point) => [x(point.s), y(point.restVolts)] as const)),
    targetY,
    targetTab: `M${width - 10} ${targetY}l10 -6.5v13z`,
    silhouette,
    slats: combSlats(band, x, (at) => x.invert(at), slat).map(
      ({ x: at, height }) => `M${n(at)} ${baseY}v${n(-ampsHeight * height)}`,
    ),
    likely: `M${n(x(band.p50))} ${baseY}V${n(voltsHeight + between)}`,
    dots: apart(
      readings.flatMap((reading) => [
        ...(reading.volts == null ? [] : [{ x: n(x(reading.s)), y: n(y(reading.volts)), odd: reading.odd === true }]),
        ...(reading.amps == null
          ? []
          : [{ x: n(x(reading.s)), y: n(yAmps(Math.abs(reading.amps))), odd: reading.odd === true }]),
      ]),
    ),
  };
}
