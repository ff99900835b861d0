import { describe, expect, it } from 'vitest';
import { pointMarks } from '@/shared/ui/format/marks';
import { earlyCheckWords, enoughWords, isDueEarly, settlesWords } from '@/shared/ui/charge/rest-words';
import { at, iso, zone } from './charges';

const plain = (text: string | null) => text?.replaceAll('\u00a0', ' ') ?? null;
const band = (p50: number) => ({ p10: p50 - 0.002, p50, p90: p50 + 0.002 });
const rest = { settledVolts: [band(3.957)], chance: 0.95, restedEnough: true, enoughAt: iso('14:20'), readings: 6 };
const clockOf = (instant: number) => (instant === at('14:20') ? '14:20' : 'another time');

describe('the forecast of a rest in words', () => {
  it('says where a group settles with its band', () => {
    expect(settlesWords(rest, pointMarks).map(plain)).toEqual(['Settles at 3.957 V (3.955–3.959)']);
    expect(settlesWords({ settledVolts: [band(3.957), band(3.961)] }, pointMarks).map(plain)).toEqual([
      'G1 settles at 3.957 V (3.955–3.959)',
      'G2 settles at 3.961 V (3.959–3.963)',
    ]);
  });

  it('tells of 12 groups only the one that settles lowest and the highest', () => {
    const many = Array.from({ length: 12 }, (_, group) => band(3.9 + (group === 4 ? -0.05 : group === 9 ? 0.05 : 0)));
    expect(settlesWords({ settledVolts: many }, pointMarks).map((line) => line.slice(0, 3))).toEqual(['G5 ', 'G10']);
  });

  it('says when it has rested enough, since when, or that it drifts on', () => {
    expect(enoughWords({ ...rest, restedEnough: false }, clockOf)).toBe('Rested enough at about 14:20.');
    expect(enoughWords(rest, clockOf)).toBe('Rested enough since 14:20: the check may come now.');
    expect(enoughWords({ restedEnough: false, enoughAt: null }, clockOf)).toMatch(/still drifts/);
  });

  it('names no later time once readings have made the check due before the minimum rest of an hour is over', () => {
    const charge = { currentEndAt: iso('13:00'), minRestS: 3600 };
    expect(isDueEarly({ ...charge, stage: 'check-due' }, at('13:42'))).toBe(true);
    expect(isDueEarly({ ...charge, stage: 'check-due' }, at('14:01'))).toBe(false);
    expect(isDueEarly({ ...charge, stage: 'resting' }, at('13:42'))).toBe(false);
    const unsure = { ...rest, restedEnough: false };
    expect(enoughWords(unsure, clockOf, true)).toBe('Readings ten minutes apart agree: the check may come now.');
    expect(enoughWords(rest, clockOf, true)).toBe('Rested enough since 14:20: the check may come now.');
  });
});

describe('a check that would come early', () => {
  const marks = pointMarks;
  const said = (due: boolean, now: string, checkDueAt: string) =>
    plain(
      earlyCheckWords(
        {
          stage: due ? 'check-due' : 'resting',
          checkDueAt: iso(checkDueAt),
          currentEndAt: iso('13:00'),
          minRestS: 3600,
        },
        { now: at(now), zone, marks },
      ),
    );

  it('is told before the rest is over, with the minutes still to go', () => {
    expect(said(false, '13:42', '14:00')).toMatch(/over at 14:00, in 18 min\. A check before then counts/);
  });

  it('is marked as early where the readings let it come 18 min before the minimum rest of an hour', () => {
    expect(said(true, '13:42', '13:40')).toMatch(/has settled\. The minimum rest is over in 18 min: .* marked early/);
  });

  it('is not early once both are over', () => {
    expect([said(true, '14:01', '13:40'), said(false, '14:01', '14:00')]).toEqual([null, null]);
  });
});
