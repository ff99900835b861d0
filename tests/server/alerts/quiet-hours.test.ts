import { afterEach, describe, expect, test } from 'vitest';
import { quietUntil } from '@/server/alerts/quiet-until';
import { isQuiet } from '@/shared/contract/quiet-hours';
import { hour, minute } from '../charges/bench';
import { checkDue, makePost, withBrowser, wish, type Post } from './post';

const night = { from: '22:00', to: '06:00' };
const at = (iso: string): number => Date.parse(iso);

describe('quiet hours in the workshop’s zone', () => {
  // Berlin changes at 01:00 UTC: on 29 March 2026 to summer time, on 25 October 2026 back.
  test.each([
    ['a night of 8 h', '2026-06-09T20:00:00Z', 8],
    ['the night to summer time has 7 h', '2026-03-28T21:00:00Z', 7],
    ['the night from summer time has 9 h', '2026-10-24T20:00:00Z', 9],
  ])('%s', (_, begins, hours) => {
    const from = at(begins);
    expect(isQuiet(night, 'Europe/Berlin', from - 1)).toBe(false);
    expect(isQuiet(night, 'Europe/Berlin', from)).toBe(true);
    const end = from + hours * hour;
    expect(isQuiet(night, 'Europe/Berlin', end - 1)).toBe(true);
    expect(isQuiet(night, 'Europe/Berlin', end)).toBe(false);
    for (let instant = from; instant < end; instant += 7 * minute)
      expect(quietUntil(night, 'Europe/Berlin', instant)).toBe(end);
  });

  test('that end at a time which the clock jumps over end with the jump', () => {
    const quiet = { from: '22:00', to: '02:30' };
    expect(quietUntil(quiet, 'Europe/Berlin', at('2026-03-28T23:10:20Z'))).toBe(at('2026-03-29T01:00:00Z'));
  });

  test('that end at a time which comes twice are over with its first coming', () => {
    const quiet = { from: '22:00', to: '02:30' };
    expect(quietUntil(quiet, 'Europe/Berlin', at('2026-10-24T23:10:00Z'))).toBe(at('2026-10-25T00:30:00Z'));
  });

  test('by day do not go over midnight, and another zone has them at another time', () => {
    const noon = { from: '12:00', to: '13:00' };
    expect(isQuiet(noon, 'Europe/Berlin', at('2026-06-09T10:30:00Z'))).toBe(true);
    expect(isQuiet(noon, 'Asia/Kathmandu', at('2026-06-09T10:30:00Z'))).toBe(false);
    expect(quietUntil(noon, 'Asia/Kathmandu', at('2026-06-09T06:20:00Z'))).toBe(at('2026-06-09T07:15:00Z'));
  });
});

describe('an alert in the quiet hours of its person', () => {
  let post: Post;
  afterEach(() => post.close());

  /** A check falls due within the night in Berlin. */
  async function byNight(begun: string): Promise<ReturnType<typeof checkDue>> {
    post = await makePost({ now: at(begun) });
    await withBrowser(post, 'technician');
    await wish(post, 'technician', { quiet: night });
    return checkDue(post);
  }
  const tags = (id: string) => post.push.taken.filter(({ notice }) => notice.id === id);

  test.each([
    ['in summer', '2026-06-09T19:00:00Z', '2026-06-10T04:00:00Z'],
    ['over the change to summer time', '2026-03-28T20:00:00Z', '2026-03-29T04:00:00Z'],
    ['over the change back', '2026-10-24T19:00:00Z', '2026-10-25T05:00:00Z'],
  ])('waits for their end, %s, and comes once then, with when it was raised', async (_, begun, ends) => {
    const { alert } = await byNight(begun);
    expect(isQuiet(night, 'Europe/Berlin', at(alert.raisedAt))).toBe(true);
    await post.dispatcher.runDue();
    post.bench.server.clock.set(at(ends) - minute);
    await post.dispatcher.runDue();
    expect(tags(alert.id)).toEqual([]);
    post.bench.server.clock.set(at(ends));
    await post.dispatcher.runDue();
    await post.dispatcher.runDue();
    expect(tags(alert.id)).toHaveLength(1);
    expect(tags(alert.id)[0]!.notice.body).toMatch(/Kept since (Tue|Sat) \d\d:\d\d for your quiet hours\.$/);
  });

  test('comes once as soon as its person takes them off, and stays where they are only moved', async () => {
    const { alert } = await byNight('2026-06-09T19:00:00Z');
    await post.dispatcher.runDue();
    await wish(post, 'technician', { quiet: { from: '21:00', to: '05:00' } });
    await post.dispatcher.runDue();
    expect(tags(alert.id)).toEqual([]);
    await wish(post, 'technician', { quiet: null });
    await post.dispatcher.runDue();
    await post.dispatcher.runDue();
    expect(tags(alert.id)).toHaveLength(1);
  });

  test('is not sent at all where somebody took it in the night', async () => {
    const { alert } = await byNight('2026-06-09T19:00:00Z');
    await post.dispatcher.runDue();
    await post.bench.as('foreman').post(`/api/alerts/${alert.id}/take`).expect(200);
    post.bench.server.clock.set(at('2026-06-10T04:00:00Z'));
    await post.dispatcher.runDue();
    expect(tags(alert.id)).toEqual([]);
  });

  test.each([
    [true, 1],
    [false, 0],
  ])('that is an alarm breaks through: %s, unless its person says otherwise', async (alarmsBreakThrough, count) => {
    await byNight('2026-06-09T19:00:00Z');
    await wish(post, 'technician', { alarmsBreakThrough });
    await post.live(20 * minute, 5 * minute);
    expect(post.push.taken.filter(({ notice }) => notice.title.startsWith('Overdue'))).toHaveLength(count);
  });
});
