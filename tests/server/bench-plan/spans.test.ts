import { describe, expect, it } from 'vitest';
import { common, earliestBegin, united, without } from '@/server/services/bench-plan/spans';

const span = (from: number, to: number) => ({ from, to });

describe('the earliest begin', () => {
  it('of 30 between what is taken is the first gap of 30, and may end where the next begins', () => {
    const taken = [span(0, 10), span(39, 50), span(80, 90)];
    expect(earliestBegin([span(0, 1000)], taken, 30)).toBe(50);
    expect(earliestBegin([span(0, 1000)], taken, 29)).toBe(10);
    expect(earliestBegin([span(0, 1000)], taken, 31)).toBe(90);
  });

  it('lies in a stretch in which it may begin, the last instant of it included, and not before it is wished', () => {
    expect(earliestBegin([span(0, 20), span(60, 70)], [span(0, 21)], 5)).toBe(60);
    expect(earliestBegin([span(0, 20)], [span(0, 20)], 5)).toBe(20);
    expect(earliestBegin([span(0, 20)], [span(0, 21)], 5)).toBeNull();
    expect(earliestBegin([span(0, 20), span(60, 70)], [], 5, 15)).toBe(15);
    expect(earliestBegin([span(0, 20), span(60, 70)], [], 5, 65)).toBe(65);
    expect(earliestBegin([span(0, 20), span(60, 70)], [], 5, 71)).toBeNull();
  });
});

describe('stretches of the day', () => {
  it('are joined where they touch, cut by one another, and counted in both', () => {
    expect(united([span(5, 9), span(0, 5), span(20, 30)])).toEqual([span(0, 9), span(20, 30)]);
    expect(without([span(0, 30)], [span(10, 12), span(25, 40)])).toEqual([span(0, 10), span(12, 25)]);
    expect(common([span(0, 10), span(20, 30)], [span(5, 25)])).toEqual([span(5, 10), span(20, 25)]);
  });
});
