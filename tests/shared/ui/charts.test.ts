import { describe, expect, it } from 'vitest';
import type { TracePlanPoint } from '@/calc/plan-types';
import { fromZero, lineDecimals, voltLines } from '@/shared/ui/charts/axis-steps';
import { layoutBars } from '@/shared/ui/charts/bar-layout';
import { layoutPicture } from '@/shared/ui/charts/charge-picture-layout';
import { pictureRows, restBandOf } from '@/shared/ui/charts/picture-rows';

describe('grid lines', () => {
  it('stand each 0.1 V on 3.62–3.98 V and each 0.2 V on 3.55–4.05 V, never more than four', () => {
    expect(voltLines(3.62, 3.98)).toEqual([3.7, 3.8, 3.9]);
    expect(voltLines(3.55, 4.05)).toEqual([3.6, 3.8, 4]);
    expect(voltLines(2.4, 4.3)).toEqual([2.5, 3, 3.5, 4]);
    for (let high = 3.06; high < 6; high += 0.01) expect(voltLines(3, high).length).toBeLessThanOrEqual(4);
  });

  it('come closer on a short axis, with the decimals that tell them apart', () => {
    const lines = voltLines(3.912, 4.012);
    expect(lines).toEqual([3.95, 4]);
    expect(lineDecimals(lines)).toBe(2);
    expect(lineDecimals([0, 10, 20])).toBe(0);
  });

  it('begin at 0 and end on a round number over the highest value', () => {
    expect(fromZero(20, 2)).toEqual({ top: 20, lines: [0, 10, 20] });
    expect(fromZero(120)).toEqual({ top: 150, lines: [0, 50, 100, 150] });
    expect(fromZero(0.7)).toEqual({ top: 1, lines: [0, 0.5, 1] });
  });
});

// A charge of one hour at 20 A from 3.60 to 3.90 V at rest, 0.05 V more at the clips, then an hour of rest.
const trace: TracePlanPoint[] = [
  { s: 0, amps: 20, clipVolts: 3.65, restVolts: 3.6 },
  { s: 3600, amps: 20, clipVolts: 3.95, restVolts: 3.9 },
  { s: 3600, amps: 0, clipVolts: 3.95, restVolts: 3.9 },
  { s: 7200, amps: 0, clipVolts: 3.9, restVolts: 3.9 },
];
const segments = [
  { kind: 'cc' as const, fromS: 0, toS: 3600 },
  { kind: 'rest' as const, fromS: 3600, toS: 7200 },
];
const band = { p10: 6600, p50: 7200, p90: 9000 };
const input = { trace, segments, band, targetVolts: 3.9, width: 358, voltsHeight: 150, ampsHeight: 66 };

describe('charge picture', () => {
  const drawing = layoutPicture(input);

  it('reaches 10 min past the latest finish and 50 mV past the data', () => {
    expect(drawing.spanS).toBe(9600);
    // 3.55 V at the foot, 4.00 V at the top of 150 px: the target of 3.90 V lies at 150·(0.10/0.45).
    expect(drawing.targetY).toBe(33.33);
    expect(drawing.toX(9600)).toBe(358);
    expect(drawing.toX(0)).toBe(44);
  });

  it('draws the current as a block of full height for its hour, the rest as a bar of 4 px', () => {
    // One hour of 9600 s on 314 px is 117.75 px; the amps panel lies between 170 and 236.
    expect(drawing.silhouette).toEqual([
      { d: 'M44 236L44 170L161.75 170V236z', color: 'charging' },
      { d: 'M161.75 232H279.5V236H161.75z', color: 'resting' },
    ]);
  });

  it('puts the comb from the earliest to the latest finish on the amps panel', () => {
    expect(drawing.slats[0]).toBe('M259.88 236v-59.4');
    const last = Number(/M([\d.]+)/.exec(drawing.slats.at(-1) ?? '')?.[1]);
    expect(last).toBeLessThanOrEqual(drawing.toX(band.p90) + 0.1);
    expect(drawing.likely).toBe('M279.5 236V170');
  });

  it('keeps a reading beyond the trace on the picture, and marks the odd one', () => {
    const more = layoutPicture({
      ...input,
      readings: [
        { s: 1800, volts: 4.1, amps: 20, odd: true },
        { s: 12_000, volts: 3.9 },
      ],
    });
    expect(more.spanS).toBe(12_600);
    expect(more.dots.map((dot) => dot.odd)).toEqual([true, true, false]);
    for (const { x, y } of more.dots) {
      expect(x).toBeGreaterThanOrEqual(44);
      expect(x).toBeLessThanOrEqual(358);
      expect(y).toBeGreaterThanOrEqual(0);
    }
  });

  it('draws 3,600 readings of an hour with no two dots on one pixel, and the one odd among them', () => {
    const readings = Array.from({ length: 3600 }, (_, s) => ({ s, volts: 3.7, amps: 20, odd: s === 1800 }));
    const { dots } = layoutPicture({ ...input, readings });
    const pixels = dots.map(({ x, y }) => `${Math.round(x)} ${Math.round(y)}`);
    expect(new Set(pixels).size).toBe(dots.length);
    // Two lines of dots, at most one for each of the 358 pixels.
    expect(dots.length).toBeLessThanOrEqual(2 * input.width);
    expect(dots.length).toBeGreaterThan(200);
    expect(dots.filter(({ odd }) => odd)).toHaveLength(2);
  });

  it('draws a discharge as high as a charge of the same amps', () => {
    const down = layoutPicture({ ...input, trace: trace.map((point) => ({ ...point, amps: -point.amps })) });
    expect(down.silhouette[0]?.d).toBe(drawing.silhouette[0]?.d);
  });
});

describe('table beside the picture', () => {
  it('reads the trace each half hour and at its end', () => {
    expect(pictureRows(trace, 1800).map((row) => [row.s, Number(row.restVolts.toFixed(3)), row.amps])).toEqual([
      [0, 3.6, 20],
      [1800, 3.75, 20],
      [3600, 3.9, 20],
      [5400, 3.9, 0],
      [7200, 3.9, 0],
    ]);
  });

  it('brings the band of the rest voltage along, halfway between two points halfway between theirs', () => {
    const banded = trace.map((point, at) => ({
      ...point,
      restLowVolts: 3.5 + at * 0.1,
      restHighVolts: 3.7 + at * 0.1,
    }));
    const step = (banded[1]!.s - banded[0]!.s) / 2;
    expect(pictureRows(banded, step)[1]!.restBand).toEqual({
      low: expect.closeTo(3.55, 9) as number,
      high: expect.closeTo(3.75, 9) as number,
    });
    expect(restBandOf(banded)).toHaveLength(banded.length);
    expect(pictureRows(trace, 1800)[1]!.restBand).toBeNull();
    expect(restBandOf(trace)).toBeUndefined();
  });

  it('is empty without a trace', () => {
    expect(pictureRows([], 1800)).toEqual([]);
  });
});

describe('bars of waiting', () => {
  const drawing = layoutBars(
    [
      { key: '16', label: 'wk 16', used: 50, lost: 100 },
      { key: '17', label: 'wk 17', used: 4, lost: 0 },
    ],
    560,
    150,
  );

  it('stand on 0, a third used and two thirds lost of 150 h on 150 px', () => {
    expect(drawing.lines.map((line) => [line.text, line.y])).toEqual([
      ['0', 150],
      ['50', 100],
      ['100', 50],
      ['150', 0],
    ]);
    expect(drawing.bars[0]?.used).toMatchObject({ y: 100, height: 50, width: 44 });
    // 2 px stay free between the two, so that they read apart without colour.
    expect(drawing.bars[0]?.lost).toMatchObject({ y: 0, height: 98 });
  });

  it('print no number into a bar too low for it, and none over a bar without loss', () => {
    expect(drawing.bars[1]?.usedTextY).toBeNull();
    expect(drawing.bars[1]?.lostTextY).toBeNull();
    expect(drawing.bars[0]?.usedTextY).toBe(121);
  });
});
