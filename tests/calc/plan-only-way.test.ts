import { describe, expect, it } from 'vitest';
import { planCharge } from '@/calc/index';
import type { PlanOption } from '@/calc/plan-types';
import { planInput, sixChannels } from './plan-fixtures';

/** The marks say which of all ways is soonest: of one way alone they mean something else. */
const unmarked = (options: readonly PlanOption[]) =>
  options.map((option) => ({ ...option, soonest: null, soonestBusbarsStay: null }));

describe('a plan of one way and finish alone', () => {
  const input = planInput({ channels: sixChannels });
  const whole = planCharge(input);

  it('has the options of the whole plan to the last digit, for every way and finish there is', () => {
    const kinds = new Set(whole.options.map(({ way, finish }) => `${way}/${finish}`));
    expect(kinds.size).toBeGreaterThan(3);
    for (const way of ['terminals', 'group-by-group', 'paralleled', 'resistor'] as const)
      for (const finish of ['over-and-settle', 'on-the-mark'] as const) {
        const alone = planCharge(input, { way, finish });
        const same = whole.options.filter((option) => option.way === way && option.finish === finish);
        expect(unmarked(alone.options)).toEqual(unmarked(same));
      }
  });

  it('refuses what the whole plan refuses', () => {
    const swollen = { ...input, spare: { ...input.spare, condition: 'swollen' as const } };
    expect(planCharge(swollen, { way: 'terminals', finish: 'on-the-mark' })).toEqual(planCharge(swollen));
  });
});
