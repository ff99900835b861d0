import { describe, expect, it } from 'vitest';
import { linkOf } from '@/shared/client/link';

const t = Date.parse('2026-06-09T11:40:00Z');
const heard = { connected: true, heardAt: t, lostAt: null };

describe('the state of the link', () => {
  it.each([
    [29_999, 'live', null],
    [30_000, 'quiet', t],
    [119_999, 'quiet', t],
    [120_000, 'down', t],
  ] as const)('%i ms after the last word it is %s', (silent, state, since) => {
    expect(linkOf(heard, t + silent)).toEqual({ state, since });
  });

  it('says nothing of a connection that is mended within 5 s, and then since when it is away', () => {
    const broken = { connected: false, heardAt: t, lostAt: t + 2000 };
    expect(linkOf(broken, t + 6999).state).toBe('live');
    expect(linkOf(broken, t + 7000)).toEqual({ state: 'down', since: t });
  });

  it('is connecting before the first word, and down when nothing comes', () => {
    expect(linkOf({ connected: false, heardAt: null, lostAt: null }, t)).toEqual({ state: 'connecting', since: null });
    expect(linkOf({ connected: false, heardAt: null, lostAt: t }, t + 5000)).toEqual({ state: 'down', since: t });
  });
});
