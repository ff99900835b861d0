import { act, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { useEffect, useState } from 'react';
import { FormatsProvider } from '@/shared/ui/format/formats';
import { ThemeProvider } from '@/shared/ui/theme/theme';
import { palettes } from '@/shared/ui/theme/tokens';
import { WallScreen } from '@/shared/ui/wall/wall-screen';
import { at, boardOf, now, zone } from './cards';

/** The wall with a clock of its own; the server falls silent after `heardAt`. */
function Ticking({ heardAt }: { heardAt: number | null }) {
  const [time, setTime] = useState(() => Date.now());
  useEffect(() => {
    const timer = setInterval(() => setTime(Date.now()), 1000);
    return () => clearInterval(timer);
  }, []);
  return (
    <ThemeProvider choice="night">
      <FormatsProvider languageTag="en-GB" zone={zone}>
        <WallScreen board={heardAt === null ? null : boardOf(6)} heardAt={heardAt} since={now} now={time} />
      </FormatsProvider>
    </ThemeProvider>
  );
}

const pass = (seconds: number) => act(() => vi.advanceTimersByTime(seconds * 1000));
const ink3 = 'rgb(155, 164, 165)';
const colorOf = (text: string) => getComputedStyle(screen.getByText(text)).color;

beforeEach(() => {
  vi.useFakeTimers();
  vi.setSystemTime(now);
});
afterEach(() => vi.useRealTimers());

describe('a wall that is not heard', () => {
  it('is live for 30 s, then says when it was heard', () => {
    render(<Ticking heardAt={now} />);
    pass(29);
    expect(screen.getByText('live, heard 13:42:00')).toBeTruthy();
    pass(1);
    expect(screen.queryByText(/^live/)).toBeNull();
    expect(screen.getByText('heard 13:42:00')).toBeTruthy();
  });

  it('turns its header to the amber band after 2 min, and stops everything below', () => {
    render(<Ticking heardAt={now} />);
    pass(119);
    expect(screen.queryByText(/Not live/)).toBeNull();
    expect(screen.getByText('now')).toBeTruthy();
    pass(1);
    expect(screen.getByText('Not live since 13:42. Times below are old.')).toBeTruthy();
    expect(screen.queryByText('6 charges, 1 overdue, 1 check due')).toBeNull();
    // The flag of the now line shows the last time heard; the device's own clock goes on at the right.
    expect(screen.queryByText('now')).toBeNull();
    expect(screen.getByText('13:42')).toBeTruthy();
    expect(screen.getByText('13:44')).toBeTruthy();
  });

  it('counts no minute further, says then instead of now, and greys every time', () => {
    render(<Ticking heardAt={now} />);
    pass(600);
    const rows = screen.getAllByRole('listitem').map((row) => row.getAttribute('aria-label'));
    expect(rows[0]).toBe('R-2406, Overdue, B2 · Bram, 22 min, over, then 14:55');
    expect(rows[1]).toBe('R-2409, Check due, A1 · Ines, 12 min, check waiting');
    expect(palettes.night.ink3.toUpperCase()).toBe('#9BA4A5');
    for (const text of ['over, then 14:55', 'check waiting', '15:30', '14:18–14:50']) expect(colorOf(text)).toBe(ink3);
  });

  it('keeps only the band after 15 min', () => {
    render(<Ticking heardAt={now} />);
    pass(899);
    expect(screen.getAllByRole('listitem')).toHaveLength(6);
    pass(1);
    expect(screen.queryAllByRole('listitem')).toHaveLength(0);
    expect(screen.getByText('Not live since 13:42. Times below are old.')).toBeTruthy();
  });

  it('is live again with the next word', () => {
    const { rerender } = render(<Ticking heardAt={now} />);
    pass(300);
    rerender(<Ticking heardAt={at('13:47')} />);
    expect(screen.getByText('live, heard 13:47:00')).toBeTruthy();
    expect(screen.getByText('now')).toBeTruthy();
    expect(screen.getAllByRole('listitem')[0]!.getAttribute('aria-label')).toContain('27 min');
  });

  it('says so when no word came at all since it was switched on', () => {
    render(<Ticking heardAt={null} />);
    pass(60);
    expect(screen.getByText('not heard yet')).toBeTruthy();
    pass(60);
    expect(screen.getByText('Not live: no word from the server yet.')).toBeTruthy();
  });
});
