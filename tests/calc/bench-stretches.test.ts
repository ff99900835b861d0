import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { intersect, merge, subtract, type Stretch } from '@/calc/index';

const drawn = fc
  .array(fc.tuple(fc.integer({ min: 0, max: 30 }), fc.integer({ min: 0, max: 10 })), { maxLength: 6 })
  .map((list) => list.map(([fromS, length]): Stretch => ({ fromS, toS: fromS + length })));
/** Second by second whether it lies in any of them. */
const seconds = (list: Stretch[]) =>
  Array.from({ length: 45 }, (_, at) => list.some(({ fromS, toS }) => fromS <= at && at < toS));
const isTidy = (list: Stretch[]) =>
  list.every(({ fromS, toS }, at) => fromS < toS && (at === 0 || list[at - 1]!.toS < fromS));

describe('stretches of time', () => {
  it('merged, taken away and in common agree second by second with membership, over 1000 pairs, and come out in order and apart', () => {
    fc.assert(
      fc.property(drawn, drawn, (a, b) => {
        const [inA, inB] = [seconds(a), seconds(b)];
        expect(seconds(merge(a))).toEqual(inA);
        expect(seconds(subtract(a, b))).toEqual(inA.map((one, at) => one && !inB[at]));
        expect(seconds(intersect(a, b))).toEqual(inA.map((one, at) => one && inB[at]));
        for (const list of [merge(a), subtract(a, b), intersect(a, b)]) expect(isTidy(list)).toBe(true);
      }),
      { numRuns: 1000 },
    );
  });

  it('what is given is left as it was', () => {
    const list = [
      { fromS: 5, toS: 9 },
      { fromS: 0, toS: 6 },
    ];
    merge(list);
    expect(list[1]).toEqual({ fromS: 0, toS: 6 });
  });
});
