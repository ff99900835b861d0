import { describe, expect, it } from 'vitest';
import {
  chargerOffsetSdVolts,
  correctedVolt,
  correctedVolts,
  isCrossChecked,
  meterOffsetSdVolts,
} from '@/server/services/meter-trust';

const now = Date.parse('2026-06-09T11:42:00Z');
const checked = (daysAgo: number) => ({ checkedAt: now - daysAgo * 86_400_000 });
const never = { checkedAt: null };

describe('how far a meter is trusted', () => {
  it('a cross-check counts for 90 days and not a second longer', () => {
    expect(isCrossChecked(checked(90), now)).toBe(true);
    expect(isCrossChecked({ checkedAt: now - 90 * 86_400_000 - 1000 }, now)).toBe(false);
    expect(isCrossChecked(never, now)).toBe(false);
  });

  it('an old or missing check widens the offset, and the worst meter of a plan counts', () => {
    const fresh = meterOffsetSdVolts([checked(10)], now)!;
    const old = meterOffsetSdVolts([checked(91)], now)!;
    expect(old).toBeGreaterThan(fresh);
    expect(meterOffsetSdVolts([checked(10), never], now)).toBe(old);
    expect(meterOffsetSdVolts([], now)).toBeUndefined();
  });

  it('a charger checked in February is less sure than one of May; one never checked is left to the planner', () => {
    expect(chargerOffsetSdVolts(checked(120), now)!).toBeGreaterThan(chargerOffsetSdVolts(checked(20), now)!);
    expect(chargerOffsetSdVolts(never, now)).toBeNull();
    expect(chargerOffsetSdVolts(null, now)).toBeNull();
  });

  it('a meter that shows 2 mV too much makes 3.968 V out of 3.970 V, without crumbs of floating point', () => {
    expect(correctedVolts([3.97, 3.961], { offsetMillivolts: 2 })).toEqual([3.968, 3.959]);
    expect(correctedVolt(3.961, { offsetMillivolts: -0.5 })).toBe(3.9615);
    expect(correctedVolt(3.961, null)).toBe(3.961);
  });
});
