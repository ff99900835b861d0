import { describe, expect, it } from 'vitest';
import {
  age,
  ageShort,
  clock,
  clockWithSeconds,
  date,
  dateLong,
  dayName,
  moment,
  readyAt,
  readyBounds,
  readyWithBand,
} from '@/shared/ui/format/clock';
import { duration, durationBand, durationTable, durationWithBand, overBy } from '@/shared/ui/format/duration';
import { marksOf, pointMarks } from '@/shared/ui/format/marks';
import { fixed, shortest } from '@/shared/ui/format/number';
import {
  ampHours,
  amps,
  capacityBand,
  celsius,
  clipVolts,
  deviation,
  deviationWords,
  millivolts,
  plannedAmps,
  range,
  share,
  tolerance,
  volts,
} from '@/shared/ui/format/quantities';

// The forms are those of look.md §7; a no-break space stands between number and unit.
const N = '\u00a0';
const minutes = (p10: number, p50: number, p90: number) => ({ p10: p10 * 60, p50: p50 * 60, p90: p90 * 60 });
const comma = marksOf('de-DE');

describe('numbers with units', () => {
  it('gives a cell voltage three decimals and the clips two', () => {
    expect(volts(3.968)).toBe(`3.968${N}V`);
    expect(volts(3.6)).toBe(`3.600${N}V`);
    expect(clipVolts(11.64)).toBe(`11.64${N}V`);
    expect(volts(3.968, comma)).toBe(`3,968${N}V`);
  });

  it('gives differences in whole millivolts with the true minus sign', () => {
    expect(millivolts(0.102)).toBe(`102${N}mV`);
    expect(tolerance(0.005)).toBe(`±5${N}mV`);
    expect(deviation(-0.007)).toBe(`\u22127${N}mV`);
    expect(deviation(0.002)).toBe(`+2${N}mV`);
  });

  it('never shows minus or plus nought', () => {
    expect(deviation(-0.0002)).toBe(`0${N}mV`);
    expect(deviation(0.0002)).toBe(`0${N}mV`);
    expect(fixed(-0.04, 1)).toBe('0.0');
  });

  it('rounds halves away from zero, also where binary stores them a hair below', () => {
    // 1.005 is stored as 1.00499999999999989…, 3.9685 as 3.96849999999999969…
    expect(fixed(1.005, 2)).toBe('1.01');
    expect(fixed(3.9685, 3)).toBe('3.969');
    expect(fixed(-0.5, 0)).toBe('\u22121');
    expect(fixed(3.96849, 3)).toBe('3.968');
  });

  it('says a deviation in words', () => {
    expect(deviationWords(-0.007)).toBe(`7${N}mV below`);
    expect(deviationWords(0.002)).toBe(`2${N}mV above`);
    expect(deviationWords(0.0004)).toBe('on the mark');
  });

  it('gives a measured current one decimal and a planned one as it is set', () => {
    expect(amps(10)).toBe(`10.0${N}A`);
    expect(plannedAmps(20)).toBe(`20${N}A`);
    expect(plannedAmps(12.5)).toBe(`12.5${N}A`);
    expect(shortest(100, 1)).toBe('100');
  });

  it('gives charge one decimal, temperature and share whole numbers', () => {
    expect(ampHours(29.7)).toBe(`29.7${N}Ah`);
    expect(capacityBand(59.5, 60.4, 61.3)).toBe('60.4 (59.5–61.3)');
    expect(celsius(20.6)).toBe(`21${N}°C`);
    expect(share(0.58)).toBe(`58${N}%`);
    expect(range('10', '45', '°C')).toBe(`10–45${N}°C`);
  });
});

describe('decimal mark by locale', () => {
  it('takes the comma for German and French, the point for English and for a tag that is none', () => {
    expect(marksOf('de-DE').decimal).toBe(',');
    expect(marksOf('fr-FR').decimal).toBe(',');
    expect(marksOf('en-GB')).toEqual(pointMarks);
    expect(marksOf('not a tag')).toEqual(pointMarks);
  });

  it('counts to 12 only where the locale does', () => {
    expect(marksOf('en-US').hour12).toBe(true);
    expect(marksOf('de-DE').hour12).toBe(false);
  });
});

describe('durations', () => {
  it('writes 3 h 40, 55 min and about 2½ days', () => {
    expect(duration(220 * 60)).toBe(`3${N}h${N}40`);
    expect(duration(55 * 60)).toBe(`55${N}min`);
    expect(duration(2.5 * 86_400)).toBe('about 2½ days');
    expect(duration(25 * 3600)).toBe('about 1 day');
  });

  it('rounds estimates to 5 min, under an hour to 1, and a countdown to the minute', () => {
    expect(duration(3 * 3600 + 2 * 60)).toBe(`3${N}h${N}00`);
    expect(duration(3 * 3600 + 3 * 60)).toBe(`3${N}h${N}05`);
    expect(duration(54 * 60 + 31)).toBe(`55${N}min`);
    expect(duration(108 * 60, 'minute')).toBe(`1${N}h${N}48`);
    expect(duration(108 * 60)).toBe(`1${N}h${N}50`);
  });

  it('passes from 59 min to 1 h 00 without a 60 min', () => {
    expect(duration(59 * 60 + 29)).toBe(`59${N}min`);
    expect(duration(59 * 60 + 31)).toBe(`1${N}h${N}00`);
  });

  it('writes 3:40 and 0:55 in tables', () => {
    expect(durationTable(220 * 60)).toBe('3:40');
    expect(durationTable(55 * 60)).toBe('0:55');
  });

  it('puts the band after the likely time, as finely told as that', () => {
    expect(durationWithBand(minutes(195, 220, 265))).toBe(`3${N}h${N}40 (3:15–4:25)`);
    expect(durationWithBand(minutes(48, 55, 70))).toBe(`55${N}min (48–70${N}min)`);
    expect(durationBand(minutes(50, 65, 91))).toBe('(0:50–1:30)');
    expect(durationBand({ p10: 2 * 86_400, p50: 2.5 * 86_400, p90: 3.5 * 86_400 })).toBe(`(2–3½${N}days)`);
  });

  it('says how far a countdown is over', () => {
    expect(overBy(22 * 60)).toBe(`22${N}min over`);
    expect(duration(-300)).toBe(`0${N}min`);
  });
});

describe('clock and calendar in the workshop’s zone', () => {
  const zone = 'Europe/Berlin';
  // Berlin is at UTC+2 in June (tz database): 13:42 there is 11:42 UTC.
  const now = Date.UTC(2026, 5, 9, 11, 42, 7);
  const at = (hour: number, minute: number, day = 9) => Date.UTC(2026, 5, day, hour - 2, minute);

  it('shows 13:42, 13:42:07 and Tue 9 June', () => {
    expect(clock(now, zone)).toBe('13:42');
    expect(clockWithSeconds(now, zone)).toBe('13:42:07');
    expect(date(now, zone)).toBe(`Tue${N}9${N}June`);
    expect(dateLong(now, zone)).toBe(`Tuesday 9${N}June`);
  });

  it('shows 12 h only where the locale counts so, midnight as 12:00 am', () => {
    const twelve = { decimal: '.' as const, hour12: true };
    expect(clock(now, zone, twelve)).toBe(`1:42${N}pm`);
    expect(clock(at(0, 0), zone, twelve)).toBe(`12:00${N}am`);
    expect(clock(at(0, 0), zone)).toBe('00:00');
  });

  it('names the day of another day, and the date beyond six days', () => {
    expect(moment(at(10, 0), zone, now)).toBe('10:00');
    expect(moment(at(10, 0, 10), zone, now)).toBe(`Wed${N}10:00`);
    expect(moment(at(10, 0, 16), zone, now)).toBe(`16${N}June${N}10:00`);
  });

  it('tells ready 17:05 (16:40–18:05), to 5 min', () => {
    const band = { p10: at(16, 41), p50: at(17, 4), p90: at(18, 6) };
    expect(readyWithBand(band, zone, now)).toBe('ready 17:05 (16:40–18:05)');
  });

  it('tells a finish within the hour to the minute', () => {
    const band = { p10: at(14, 18), p50: at(14, 24), p90: at(14, 51) };
    expect([readyAt(band, zone, now), readyBounds(band, zone, now)]).toEqual(['14:24', '14:18–14:51']);
  });

  it('says to the minute where only the rest’s timer runs, and a span where a minute lies between', () => {
    const timer = { p10: at(14, 24), p50: at(14, 24), p90: at(14, 24) };
    expect(readyWithBand(timer, zone, now)).toBe('ready 14:24 (to the minute)');
    expect(readyBounds({ ...timer, p90: at(14, 25) }, zone, now)).toBe('14:24–14:25');
    // Farther off than an hour all is told to 5 min.
    expect(readyBounds({ p10: at(17, 4), p50: at(17, 5), p90: at(17, 6) }, zone, now)).toBe(`to 5${N}min`);
  });

  it('names the day of a bound that falls on another day than the likely finish', () => {
    const band = { p10: at(23, 30), p50: at(0, 30, 10), p90: at(2, 0, 10) };
    expect(readyWithBand(band, zone, now)).toBe(`ready Wed${N}00:30 (Tue${N}23:30–02:00)`);
  });

  it('counts age in calendar days of the zone', () => {
    // 23:50 the evening before is yesterday, although less than 14 hours ago.
    expect(age(at(23, 50, 8), zone, now)).toBe('yesterday');
    expect(age(at(0, 5), zone, now)).toBe('today');
    expect(age(at(12, 0, 9) - 12 * 86_400_000, zone, now)).toBe(`12${N}days`);
    expect(ageShort(at(12, 0) - 71 * 86_400_000, zone, now)).toBe(`71${N}d`);
  });

  it('names the day a time field speaks of', () => {
    expect(dayName('2026-06-09', '2026-06-09')).toBe('today');
    expect(dayName('2026-06-10', '2026-06-09')).toBe('tomorrow');
    expect(dayName('2026-06-12', '2026-06-09')).toBe(`Fri${N}12${N}June`);
  });
});
