import { describe, expect, it } from 'vitest';
import {
  channelsNeeded,
  mannWhitney,
  medianDifference,
  plannedAgainstActual,
  quantile,
  replayCharges,
  shelfVolts,
  type RecordedCharge,
  type ReplayInput,
} from '@/calc/index';

/*
 * Ten charges worked through on paper, twice over, 100 000 min apart so that the two do not meet (20 are needed). One
 * channel, always open, 60 min each by the model and in truth, half of each wait used. They come every 30 min: 0, 30 … 270.
 * One channel: charge i begins at 60i and is ready at 60(i + 1), 30i + 60 min after it came: 60, 90 … 330 min, in hours
 * 1, 1.5 … 5.5. Median of the twenty: 3.25 h. Rank 0.9 · 19 = 17.1: the 17th and the 18th (from 0) are 5 and 5.5 → 5.05.
 * Two channels: nobody waits: 1 h each. All 32.5 h twice, half of it lost: 32.5 h, over 100 270 min = 10 weeks: 3.25 h.
 * Booked 600 min before they came, one channel: the last begins 540 min after the first booking, ready before it is wanted.
 */
const charges: RecordedCharge[] = [0, 100_000].flatMap((from) =>
  Array.from({ length: 10 }, (_, at) => ({
    id: `${from}-${at}`,
    arrivalMinutes: from + 30 * at,
    bookedMinutes: from + 30 * at - 600,
    dueMinutes: null,
    kind: 0,
    actualMinutes: 60,
    usedShare: 0.5,
    ranUnwatched: false,
  })),
);
const input: ReplayInput = {
  charges,
  channels: [1],
  open: null,
  lookInMinutes: 60,
  durationMinutes: (_, __, levers) => 600 / (levers.amps?.amps ?? 10),
  seed: 1,
};

function figures(...levers: Parameters<typeof replayCharges>[1][]) {
  const ran = replayCharges(input, Object.assign({}, ...levers))!;
  if (!ran.enough) throw new Error('too few');
  return ran;
}

describe('ten charges on paper', () => {
  it('gives 3.25 lost hours a week, half ready within 3.25 h and 90 % within 5.05 h', () => {
    const ran = figures({});
    expect(ran.count).toBe(20);
    expect(ran.lostHoursPerWeek.value).toBeCloseTo(3.25, 9);
    expect(ran.p50WaitHours.value).toBeCloseTo(3.25, 9);
    expect(ran.p90WaitHours.value).toBeCloseTo(5.05, 9);
    expect(ran.lostHoursPerWeek.low).toBeLessThanOrEqual(3.25);
    expect(ran.lostHoursPerWeek.high).toBeGreaterThanOrEqual(3.25);
  });

  it('leaves 1 h with a second channel, 0.5 h with twice the amps, and none with a start at booking', () => {
    expect(figures({ moreOfKind: 0 }).p90WaitHours.value).toBeCloseTo(1, 9);
    expect(figures({ amps: { kind: 0, amps: 20 } }).p90WaitHours.value).toBeCloseTo(0.5, 9);
    expect(figures({ startAtBooking: true }).lostHoursPerWeek.value).toBe(0);
    expect(figures({ moreOfKind: 0 }, { amps: { kind: 0, amps: 40 } }).p50WaitHours.value).toBeCloseTo(0.25, 9);
  });

  it('keeps what really happened: a charge that took twice its model takes twice the model of other amps', () => {
    const slow = { ...input, charges: charges.map((one) => ({ ...one, actualMinutes: 120 })) };
    const ran = replayCharges(slow, { amps: { kind: 0, amps: 40 } })!;
    expect(ran.enough && ran.p90WaitHours.value).toBeCloseTo(0.5, 9);
  });

  it('says that it needs 20 and has 12', () => {
    expect(replayCharges({ ...input, charges: charges.slice(0, 12) }, {})).toEqual({
      enough: false,
      needs: 20,
      has: 12,
    });
  });

  it('needs 2 channels for 90 % within 1 h and 1 for 5.1 h', () => {
    const needed = (wishedP90Hours: number) => channelsNeeded(input, {}, { kind: 0, wishedP90Hours });
    expect(needed(1)).toMatchObject({ channels: 2 });
    expect(needed(5.1)).toMatchObject({ channels: 1 });
    expect(needed(0.9)).toMatchObject({ channels: null, roughChannels: null });
  });
});

describe('what figures say', () => {
  it('has the type-7 percentiles of Hyndman and Fan', () => {
    const one = [15, 20, 35, 40, 50];
    [0.05, 0.25, 0.4, 0.5, 0.75, 0.9, 0.95].forEach((p, at) =>
      expect(quantile(one, p)).toBeCloseTo([16, 20, 29, 35, 40, 46, 48][at]!, 9),
    );
    const other = [2.5, 3, 3.1, 3.4, 3.6, 3.9, 4.2, 6.5];
    [0.5, 0.8, 0.9, 0.95].forEach((p, at) => expect(quantile(other, p)).toBeCloseTo([3.5, 4.08, 4.89, 5.695][at]!, 9));
  });

  it('puts the shelf at the b/(a+b) quantile of the targets for constant currents, on a grid of 5 mV', () => {
    // One volt is one ampere-hour; up at 3 A, down at 1 A: the quarter quantile of 101 targets from 3.5 to 4 is 3.625.
    const targetVolts = Array.from({ length: 101 }, (_, at) => 3.5 + at / 200);
    const minutesBetween = (from: number, to: number) => (60 * Math.abs(to - from)) / (to > from ? 3 : 1);
    const shelf = { targetVolts, minutesBetween, stockVolts: [3.625, 3.325], window: { lowVolts: 3.4, highVolts: 4 } };
    expect(shelfVolts(shelf).best.shelfVolts).toBeCloseTo(quantile(targetVolts, 1 / 4), 9);
    expect(shelfVolts(shelf).stockChargerHours).toBeCloseTo(0.1, 9);
    expect(shelfVolts({ ...shelf, window: { lowVolts: 3.7, highVolts: 4 } }).best.shelfVolts).toBeCloseTo(3.7, 9);
  });

  it('ranks with ties as by hand, and finds no difference between equal periods', () => {
    // 1 2 2 | 2 3 4: ranks of the first 1, 3, 3, sum 7, U = 1; the tie of three takes 24/30 off 7: variance
    // 9/12 · 6.2 = 4.65, z = (4.5 − 1 − 0.5)/√4.65 = 1.39122; two-sided 0.1642 by the table of the normal.
    const { u, p } = mannWhitney([1, 2, 2], [2, 3, 4]);
    expect(u).toBe(1);
    expect(p).toBeCloseTo(0.1642, 3);
    expect(mannWhitney([5, 5], [5, 5]).p).toBe(1);
    const many = Array.from({ length: 60 }, (_, at) => at);
    const moved = medianDifference(
      many,
      many.map((one) => one + 40),
      3,
    );
    expect(moved.value).toBe(40);
    expect(moved.low).toBeGreaterThan(0);
  });

  it('says the bias, the median error and the share in the band, and that four are too few', () => {
    const row = (actualMinutes: number) => ({ plannedMinutes: 100, lowMinutes: 90, highMinutes: 110, actualMinutes });
    expect(plannedAgainstActual([95, 100, 105, 110, 140].map(row))).toEqual({
      count: 5,
      tooFew: false,
      biasMinutes: 10,
      medianAbsoluteErrorMinutes: 5,
      shareInBand: 0.8,
    });
    expect(plannedAgainstActual([95, 100, 105, 110].map(row)).tooFew).toBe(true);
  });
});
