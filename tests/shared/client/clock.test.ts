import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { makeClock, offsetOf, type ClockSample } from '@/shared/client/clock';

const day = 86_400_000;

/** A question over a network: out and back take their own time, the server's clock leads by `skew`. */
const ask = (sentAt: number, skew: number, out: number, back: number, thinking = 2): ClockSample => ({
  sentAt,
  receivedAt: sentAt + out + skew,
  answeredAt: sentAt + out + thinking + skew,
  heardAt: sentAt + out + thinking + back,
});

describe('offset by four time-stamps', () => {
  it.each([0, 250, -3_600_000, day, -day])('finds a skew of %i ms exactly over an even network', (skew) => {
    expect(offsetOf([ask(1_000_000, skew, 40, 40)])).toEqual({ offsetMs: skew, roundTripMs: 80 });
  });

  it('is never off by more than half the round trip, whatever the two ways take', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: -day, max: day }),
        fc.integer({ min: 0, max: 4000 }),
        fc.integer({ min: 0, max: 4000 }),
        (skew, out, back) => {
          const { offsetMs, roundTripMs } = offsetOf([ask(5_000_000, skew, out, back)])!;
          expect(Math.abs(offsetMs - skew)).toBeLessThanOrEqual(roundTripMs / 2);
        },
      ),
    );
  });

  it('takes the shortest round trip of five, not the last', () => {
    const trips = [
      [300, 20],
      [30, 31],
      [10, 12],
      [900, 5],
      [60, 400],
    ] as const;
    const samples = trips.map(([out, back], i) => ask(i * 10_000, 5000, out, back));
    expect(offsetOf(samples)).toEqual({ offsetMs: 4999, roundTripMs: 22 });
  });

  it('leaves out a question during which the device’s clock was set back', () => {
    const broken = { ...ask(1_000_000, 0, 20, 20), heardAt: 900_000 };
    expect(offsetOf([broken])).toBeNull();
    expect(offsetOf([broken, ask(2_000_000, 70, 20, 20)])!.offsetMs).toBe(70);
  });
});

describe('the corrected clock', () => {
  /** A device whose clock a test moves by hand. */
  function device(start: number) {
    const state = { now: start };
    return { state, clock: makeClock(() => state.now) };
  }

  it.each([day, -day])('shows the server’s time at once on a device that is %i ms off', (skew) => {
    const { state, clock } = device(10_000_000);
    clock.correct(skew);
    expect(clock.now()).toBe(state.now + skew);
    const ends = state.now + skew + 60_000;
    state.now += 45_000;
    expect(ends - clock.now()).toBe(15_000);
  });

  it('slews a drift of 400 ms within 8 s, never jumps and never runs back', () => {
    const { state, clock } = device(0);
    clock.correct(0);
    clock.correct(400);
    let last = clock.now();
    expect(last).toBe(0);
    for (let ms = 0; ms < 8000; ms += 100) {
      state.now += 100;
      const now = clock.now();
      expect(now - last).toBeGreaterThanOrEqual(95);
      expect(now - last).toBeLessThanOrEqual(105.001);
      last = now;
    }
    expect(clock.now()).toBe(state.now + 400);
  });

  it('slews backwards without ever running back', () => {
    const { state, clock } = device(0);
    clock.correct(0);
    clock.correct(-900);
    let last = clock.now();
    for (let ms = 0; ms < 20_000; ms += 50) {
      state.now += 50;
      expect(clock.now()).toBeGreaterThan(last);
      last = clock.now();
    }
    expect(clock.now()).toBe(state.now - 900);
  });

  it('steps a drift of 1.5 s and tells the screens', () => {
    const { state, clock } = device(0);
    clock.correct(0);
    let steps = 0;
    clock.onStep(() => steps++);
    clock.correct(1500);
    expect([clock.now(), steps]).toEqual([state.now + 1500, 1]);
  });

  it('takes the Date header of an answer until it is measured, and not after', () => {
    const { state, clock } = device(50_000_000);
    clock.rough(50_000_000 + day);
    expect(Math.abs(clock.now() - (state.now + day))).toBeLessThanOrEqual(500);
    clock.correct(day + 123);
    clock.rough(0);
    state.now += 60_000;
    expect(clock.now()).toBe(state.now + day + 123);
  });

  it('leaves a device that is right to a second alone before it is measured', () => {
    const { state, clock } = device(1_000_000_700);
    clock.rough(1_000_000_000);
    expect(clock.now()).toBe(state.now);
  });
});

describe('a page without a connection, on a phone that is 7 min off', () => {
  const off = 7 * 60_000;
  /** The phone's clock is what is set by hand; the steady one runs by itself and stands still in sleep. */
  function phone() {
    const state = { device: 1_000_000_000 + off, steady: 5000 };
    const clock = makeClock(
      () => state.device,
      () => state.steady,
    );
    const pass = (ms: number, asleep = false) => {
      state.device += ms;
      if (!asleep) state.steady += ms;
    };
    return { state, clock, pass };
  }

  it('counts by what was measured before the page was closed', () => {
    const { clock } = phone();
    clock.recall(-off);
    expect(clock.now()).toBe(1_000_000_000);
    expect(clock.offset()).toBe(-off);
  });

  it('believes what is measured over what it recalls, and recalls nothing after that', () => {
    const { clock } = phone();
    clock.recall(-2 * off);
    clock.correct(-off);
    clock.recall(-2 * off);
    expect(clock.now()).toBe(1_000_000_000);
  });

  it('goes on without a jump where the phone is set right by 7 min back', () => {
    const { state, clock, pass } = phone();
    clock.correct(-off);
    pass(60_000);
    expect(clock.now()).toBe(1_000_060_000);
    state.device -= off;
    expect(clock.now()).toBe(1_000_060_000);
    pass(30_000);
    expect([clock.now(), clock.offset()]).toEqual([1_000_090_000, 0]);
  });

  it('goes on over 8 h of sleep, in which the steady clock stood still', () => {
    const { clock, pass } = phone();
    clock.correct(-off);
    clock.now();
    pass(8 * 3600_000, true);
    expect(clock.now()).toBe(1_000_000_000 + 8 * 3600_000);
  });
});
