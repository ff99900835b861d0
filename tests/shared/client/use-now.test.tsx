import { act, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { serverClock, useNow } from '@/shared/client/clock';

const start = Date.parse('2026-06-09T11:42:00.400Z');
let drawn: number[];

function Clock({ every }: { every: number }) {
  const now = useNow(every);
  drawn.push(now);
  return <p>{new Date(now).toISOString()}</p>;
}
const shown = () => screen.getByText(/^2026/).textContent;
/** Time goes by in small steps, so that every drawing is one of its own. */
const pass = (ms: number) => {
  for (let left = ms; left > 0; left -= 100) act(() => vi.advanceTimersByTime(100));
};

beforeEach(() => {
  vi.useFakeTimers();
  vi.setSystemTime(start);
  serverClock.correct(0);
  drawn = [];
});
afterEach(() => vi.useRealTimers());

describe('useNow', () => {
  it('ticks within 10 ms after each full second', () => {
    render(<Clock every={1000} />);
    pass(5000);
    expect(drawn).toHaveLength(6);
    for (const now of drawn.slice(1)) expect(now % 1000).toBeLessThanOrEqual(10);
  });

  it('draws a clock of minutes once a minute', () => {
    render(<Clock every={60_000} />);
    pass(180_000);
    expect(drawn).toHaveLength(4);
  });

  it('goes over to the server’s time at once when the device is a day off', () => {
    render(<Clock every={60_000} />);
    act(() => serverClock.correct(-86_400_000));
    expect(shown()).toMatch(/^2026-06-08T11:42:00/);
    act(() => serverClock.correct(0));
  });

  it('is right at once when the page is shown again after its timers slept', () => {
    render(<Clock every={60_000} />);
    vi.setSystemTime(start + 3_600_000);
    act(() => void document.dispatchEvent(new Event('visibilitychange')));
    expect(shown()).toMatch(/^2026-06-09T12:42:00/);
  });

  it('keeps no timer when nobody looks', () => {
    const { unmount } = render(<Clock every={1000} />);
    pass(2000);
    unmount();
    expect(vi.getTimerCount()).toBe(0);
  });

  it('shows no old time to the next who looks', () => {
    const first = render(<Clock every={1000} />);
    first.unmount();
    vi.setSystemTime(start + 600_000);
    render(<Clock every={1000} />);
    expect(shown()).toMatch(/^2026-06-09T11:52:00/);
  });
});
