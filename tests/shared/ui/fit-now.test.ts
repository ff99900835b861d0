import { describe, expect, it } from 'vitest';
import { fitNow } from '@/shared/ui/work/fit-now';
import { at, brakes, cleaning, fit, free } from '../../app/work/works';

describe('work beside a free stretch that has begun', () => {
  const stretch = free('14:00', '14:40');

  it.each([
    ['13:50', { from: at('14:00'), to: at('14:30') }],
    ['14:00', { from: at('14:00'), to: at('14:30') }],
    ['14:10', { from: at('14:10'), to: at('14:40') }],
  ])('30 min into 40 min fit at %s', (clock, span) => {
    expect(fitNow(fit(brakes, '14:00', '14:30'), stretch, at(clock))).toEqual({ fits: true, ...span, minutes: 30 });
  });

  it('30 min into 40 min are 1 min too long at 14:11, and 15 at 14:25', () => {
    const over = (clock: string) => fitNow(fit(brakes, '14:00', '14:30'), stretch, at(clock));
    expect(over('14:11')).toMatchObject({ fits: false, overByMinutes: 1 });
    expect(over('14:25')).toMatchObject({ fits: false, overByMinutes: 15 });
  });

  it('a look-in within it keeps its 5 min: what ended at 14:35 ends at the end 5 min later, and no more after that', () => {
    const seen = fit(brakes, '14:00', '14:35');
    expect(fitNow(seen, stretch, at('14:05'))).toMatchObject({ fits: true, to: at('14:40'), minutes: 30 });
    expect(fitNow(seen, stretch, at('14:06'))).toMatchObject({ fits: false, overByMinutes: 1 });
  });

  it('of what can be split 40 min shrink with the stretch to the least part of 15, and then are too long', () => {
    const part = fit(cleaning, '14:00', '14:40', { minutes: 40 });
    expect(fitNow(part, stretch, at('14:10'))).toMatchObject({ fits: true, minutes: 30, to: at('14:40') });
    expect(fitNow(part, stretch, at('14:25'))).toMatchObject({ fits: true, minutes: 15 });
    expect(fitNow(part, stretch, at('14:26'))).toMatchObject({ fits: false, overByMinutes: 1 });
  });

  it('what did not fit before says why as the server said it', () => {
    const no = fit(brakes, '14:00', '14:30', { span: null, because: 'bay 4 is taken until 15:20' });
    expect(fitNow(no, stretch, at('14:00'))).toEqual({
      fits: false,
      overByMinutes: null,
      because: 'bay 4 is taken until 15:20',
    });
  });
});
