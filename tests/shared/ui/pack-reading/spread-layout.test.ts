import { describe, expect, it } from 'vitest';
import type { SpreadBar } from '@/shared/ui/pack-reading/prove-words';
import { axisWidth, barWidth, layoutSpread, notchWidth } from '@/shared/ui/pack-reading/spread-layout';

const read = (p50: number, place: number): SpreadBar => ({
  ...{ key: `r${place}`, name: '', short: '', at: '2026-06-09T09:00:00.000Z', spread: { p10: p50, p50, p90: p50 } },
});
const expected = (p50: number, place: number): SpreadBar => ({
  ...{ key: `e${place}`, name: '', short: '', at: null, spread: { p10: p50 - 2, p50, p90: p50 + 2 } },
});
// The numbers of the drawn screen: 88, 16 and 11 mV read, 7 (5–9) and 5 (3–7) mV expected, 8 mV the aim.
const bars = [...[88, 16, 11].map(read), ...[7, 5].map(expected)];

describe('the bars of the spread', () => {
  it('stand on one scale from 0 that the arrival’s 88 mV do not set: 11 mV are 11/16 of 16 mV, and 88 mV are cut', () => {
    const { bars: drawn, aimY, lines } = layoutSpread(bars, 8, 358, 150);
    const tall = drawn.map(({ y }) => 150 - y);
    expect(drawn.map(({ cut }) => cut)).toEqual([true, false, false, false, false]);
    expect(tall[2]! / tall[1]!).toBeCloseTo(11 / 16, 6);
    expect((150 - aimY) / tall[1]!).toBeCloseTo(8 / 16, 6);
    expect(tall[0]).toBeGreaterThan(tall[1]!);
    expect(lines.length).toBeLessThanOrEqual(4);
    expect(lines[0]).toEqual({ y: 150, text: '0' });
  });

  it('have whiskers where they are expected, from the 10th to the 90th percentile, and none where they were read', () => {
    const { bars: drawn } = layoutSpread(bars, 8, 358, 150);
    expect(drawn.map(({ whisker }) => whisker !== null)).toEqual([false, false, false, true, true]);
    const { y, whisker } = drawn[3]!;
    expect((150 - whisker!.low) / (150 - y)).toBeCloseTo(5 / 7, 6);
    expect((150 - whisker!.high) / (150 - y)).toBeCloseTo(9 / 7, 6);
  });

  it('of 12 readings and 20 expected keep the first, the latest and the next two, side by side within 320 px', () => {
    const many = [
      ...Array.from({ length: 12 }, (_, i) => read(60 - i, i)),
      ...Array.from({ length: 20 }, (_, i) => expected(40 - i, i)),
    ];
    const { bars: drawn, left } = layoutSpread(many, 8, 320, 150);
    expect(drawn.map(({ bar }) => bar.key)).toEqual(['r0', 'r10', 'r11', 'e0', 'e1']);
    expect(left).toBe(27);
    drawn.slice(1).forEach(({ x }, i) => expect(x - drawn[i]!.x).toBeGreaterThanOrEqual(barWidth + 10));
    expect(drawn[0]!.x - barWidth / 2).toBeGreaterThan(axisWidth);
    expect(drawn.at(-1)!.x + barWidth / 2).toBeLessThan(320 - notchWidth);
  });

  it('of an arrival alone show it whole', () => {
    expect(layoutSpread([read(88, 0)], 8, 358, 150).bars[0]!.cut).toBe(false);
  });
});
