import { beforeAll, describe, expect, it } from 'vitest';
import { calibrate, heldText, pooled, SHARES, type Held } from './reference/calibration';

/*
 * A share of the 4,000 charges that the bench draws (npm run bench -- calibration): 4 × 150, seeds 1 to 4. Of 600 charges of
 * which 80 % are to be inside, 3.3 standard deviations of the binomial are 5.4 %; the whole is asked for ±2 % before and ±3 %
 * while it runs.
 */
const SEEDS = [1, 2, 3, 4];
const EACH = 150;
const slack = (count: number): number => 3.3 * Math.sqrt((0.8 * 0.2) / count);

describe('the 80 % band against charges of the integrator with a random source of its own', () => {
  let asStated: Held[];
  beforeAll(() => {
    asStated = pooled(SEEDS.map((seed) => calibrate(seed, EACH, 'as stated')));
  }, 240_000);

  it.each(SHARES.map((share, at) => ({ share, at })))(
    'holds 80 % of 600 charges to within chance at $share of the charge',
    ({ at }) => {
      const { inside, count } = asStated[at]!;
      expect(count).toBe(600);
      const text = heldText('as stated', asStated).join('\n');
      expect(Math.abs(inside / count - 0.8), text).toBeLessThan(slack(count));
    },
  );

  it('is narrower at three quarters than at a quarter by a fifth or more', () => {
    expect(asStated[3]!.widthS).toBeLessThan(0.8 * asStated[1]!.widthS);
  });

  it.each(['two time constants', 'leads unknown', 'curve off by 10 mV'])(
    'in a world of %s, which it was not told of, holds 70 % of the charges, no wider than 1.5 times',
    (twist) => {
      const held = pooled([5, 6].map((seed) => calibrate(seed, 100, twist)));
      const sum = (of: (one: (typeof held)[number]) => number): number =>
        held.reduce((total, one) => total + of(one), 0);
      const text = heldText(twist, held, asStated).join('\n');
      // Of 200 charges 3.3 % is one standard deviation; the same ones looked at four times say little more than once.
      expect(sum((one) => one.inside) / sum((one) => one.count), text).toBeGreaterThan(0.7 - 0.033);
      held.forEach((one, at) => {
        expect(one.inside / one.count, text).toBeGreaterThan(0.7 - 2 * 0.033);
        expect(one.widthS, text).toBeLessThan(1.5 * asStated[at]!.widthS);
      });
    },
  );
}, 240_000);
