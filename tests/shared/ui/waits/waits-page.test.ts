import { describe, expect, it } from 'vitest';
import type { WaitWeekDto } from '@/shared/contract/waits';
import { stageLabelPlaces } from '@/shared/ui/waits/stage-label-places';
import { weekFigure } from '@/shared/ui/waits/week-figure';

const week = (monday: string, number: number, lostHours: number): WaitWeekDto => ({
  monday,
  week: number,
  charges: 20,
  few: false,
  usedHours: 0,
  lostHours,
  waitHours: lostHours + 20,
  medianS: 3600,
  p90S: 7200,
});

describe('the hours lost in a week', () => {
  const weeks = [week('2026-05-25', 22, 90.4), week('2026-06-01', 23, 62.1), week('2026-06-08', 24, 11)];

  it('are those of the last whole week, against the first whole one: on a Tuesday the present week does not count', () => {
    expect(weekFigure(weeks, '2026-06-09')).toEqual({
      monday: '2026-06-01',
      title: 'Lost in week 23',
      hours: 62.1,
      note: '28\u00a0h less than in week 22',
    });
  });

  it('count a week on the Monday after it, not on its own Sunday', () => {
    expect(weekFigure(weeks, '2026-06-14')?.title).toBe('Lost in week 23');
    expect(weekFigure(weeks, '2026-06-15')?.title).toBe('Lost in week 24');
  });

  it('are said to be so far where no whole week is there yet, and are left out where no week is', () => {
    expect(weekFigure(weeks.slice(2), '2026-06-09')).toMatchObject({ title: 'Lost in week 24', note: 'so far' });
    expect(weekFigure([], '2026-06-09')).toBeNull();
  });
});

describe('the labels under the ribbon of stages', () => {
  it('stand under the beginning of their stage where there is room', () => {
    expect(stageLabelPlaces([0, 200, 400, 600, 700], 800)).toEqual([0, 200, 400, 600, 700]);
  });

  it('never overlap and never run off, however short the stages are', () => {
    for (const begins of [
      [0, 5, 10, 15, 20],
      [0, 1, 2, 780, 799],
      [0, 790, 795, 798, 799],
    ]) {
      const places = stageLabelPlaces(begins, 800)!;
      expect(places[0]).toBeGreaterThanOrEqual(0);
      expect(places.at(-1)! + 92).toBeLessThanOrEqual(800);
      places.slice(1).forEach((place, i) => expect(place - places[i]!).toBeGreaterThanOrEqual(92));
    }
  });

  it('go into rows where five do not fit', () => {
    expect(stageLabelPlaces([0, 50, 100, 150, 200], 358)).toBeNull();
  });
});
