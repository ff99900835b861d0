import { describe, expect, it } from 'vitest';
import {
  ghostOf,
  ghostSegments,
  heldBy,
  isOther,
  onChannel,
  placedAt,
  soonestPlace,
  standsAt,
  stepChannel,
  stepTime,
  subjectOf,
} from '@/shared/ui/bench-plan/move-candidate';
import { places } from '../../../app/bench-plan/answers-of';
import { at, charges, iso, plan } from '../../../app/bench-plan/plan-of';

const r2421 = charges.find(({ card }) => card.title === 'R-2421')!;
const stands = standsAt(r2421)!;

describe('a charge that is moved', () => {
  it('begins where it stands, which is no other place', () => {
    expect(stands).toEqual({ channelId: 'a1', clipOn: at('14:45') });
    expect(isOther(stands, stands)).toBe(false);
    expect(isOther({ ...stands, clipOn: at('15:00') }, stands)).toBe(true);
  });

  it('goes by quarter hours: from 14:45 to 15:00, and earlier down to the soonest 14:00 and no further', () => {
    expect(stepTime(stands, places, 1).clipOn).toBe(at('15:00'));
    let earlier = stands;
    for (let i = 0; i < 9; i++) earlier = stepTime(earlier, places, -1);
    expect(earlier.clipOn).toBe(at('14:00'));
  });

  it('that stands where it cannot begin any more goes later to the soonest, and not earlier', () => {
    const missed = { channelId: 'a1', clipOn: at('13:30') };
    expect(stepTime(missed, places, 1).clipOn).toBe(at('14:00'));
    expect(stepTime(missed, places, -1)).toBe(missed);
  });

  it('comes back to full quarters from a time between them', () => {
    expect(stepTime({ channelId: 'a1', clipOn: at('14:52') }, places, 1).clipOn).toBe(at('15:00'));
    expect(stepTime({ channelId: 'a1', clipOn: at('14:52') }, places, -1).clipOn).toBe(at('14:45'));
  });

  it('goes down over the channels that cannot do it: A1, A2, C1, and stays at the last', () => {
    const a2 = stepChannel(stands, places, 1);
    expect(a2).toEqual({ channelId: 'a2', clipOn: at('15:45') });
    const c1 = stepChannel(a2, places, 1);
    expect(c1.channelId).toBe('c1');
    expect(stepChannel(c1, places, 1)).toBe(c1);
    expect(stepChannel(c1, places, -1).channelId).toBe('a2');
  });

  it('is nowhere on a channel that cannot do it', () => {
    expect(onChannel(places, 'c2', at('15:00'))).toBeNull();
    expect(placedAt({ channelId: 'c2', clipOn: at('15:00') }, places, null)).toBeNull();
  });

  it('clipped on 30 min after the soonest is ready 30 min later, and late by what its latest misses', () => {
    const later = placedAt({ channelId: 'a1', clipOn: at('14:30') }, places, iso('17:30'))!;
    expect(later.ready).toEqual({ early: iso('16:55'), likely: iso('17:10'), late: iso('17:40') });
    expect(later.lateByMinutes).toBe(10);
  });

  it('is soonest ready on C1', () => expect(soonestPlace(places)?.channelName).toBe('C1'));

  it('is drawn as long as it takes there: 80 min on C1 in place of 155 on A1', () => {
    const candidate = { channelId: 'c1', clipOn: at('13:45') };
    const there = placedAt(candidate, places, null)!;
    const ghost = ghostOf(r2421, candidate, there);
    const zero = at('08:00');
    const drawn = ghostSegments(ghost.segments, candidate, there, zero);
    expect(zero + drawn[0]!.fromS * 1000).toBe(at('13:45'));
    expect(zero + drawn.at(-1)!.toS * 1000).toBeCloseTo(at('15:05'), -1);
    // The parts keep their shares: 65 of 155 min are constant current.
    expect((drawn[0]!.toS - drawn[0]!.fromS) / 60).toBeCloseTo((80 * 65) / 155, 6);
  });

  it('names who has the channel meanwhile, and nobody where it is free', () => {
    const b2 = placedAt({ channelId: 'a1', clipOn: at('16:00') }, places, null)!;
    expect(heldBy({ channelId: 'b1', clipOn: at('16:00') }, 'R-2421', b2, plan)?.title).toBe('R-2418');
    expect(heldBy({ channelId: 'a1', clipOn: at('16:00') }, 'R-2421', b2, plan)).toBeNull();
  });

  it('can be one of the queue whose day is not shown', () => {
    const other = { ...plan, charges: plan.charges.filter(({ card }) => card.title !== 'R-2421') };
    expect(subjectOf(other, 'R-2421')).toMatchObject({ stands, fixedBecause: null, charge: null });
    expect(subjectOf(other, 'R-9999')).toBeNull();
  });
});
