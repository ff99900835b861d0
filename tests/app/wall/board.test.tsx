import { render, screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { FormatsProvider } from '@/shared/ui/format/formats';
import { ThemeProvider } from '@/shared/ui/theme/theme';
import { burnInShift, isDim } from '@/shared/ui/wall/wall-link';
import { timeOf, wallCards } from '@/shared/ui/wall/wall-model';
import { WallScreen, type WallScreenProps } from '@/shared/ui/wall/wall-screen';
import { stageOf } from '@/shared/ui/wall/wall-stage';
import { at, boardOf, card, now, zone } from './cards';

const wall = (props: Partial<WallScreenProps>) =>
  render(
    <ThemeProvider choice="night">
      <FormatsProvider languageTag="en-GB" zone={zone}>
        <WallScreen board={boardOf(6)} heardAt={now} since={now} now={now} {...props} />
      </FormatsProvider>
    </ThemeProvider>,
  );
const rows = () => screen.queryAllByRole('listitem').map((row) => row.getAttribute('aria-label'));

describe('how many charges make which wall', () => {
  it('of none says so, counts the free channels and tells what comes first', () => {
    const next = { title: 'R-2404', clipOnAt: new Date(at('14:05')).toISOString(), channelNames: ['A2'] };
    wall({ board: boardOf(0, { next }) });
    expect(screen.getByText('No charges.')).toBeTruthy();
    expect(screen.getByText('Two channels free. The first is R-2404 at 14:05, on A2.')).toBeTruthy();
    expect(screen.getByText('no charges')).toBeTruthy();
    expect(rows()).toEqual([]);
  });

  it.each([
    [1, 1, false],
    [6, 6, true],
    [7, 7, true],
    [8, 8, false],
    [14, 14, false],
    [20, 14, false],
  ])('of %i shows %i rows', (count, shown) => {
    wall({ board: boardOf(count) });
    expect(rows()).toHaveLength(shown);
  });

  it('of 1 to 7 shares one axis with one flag for now; of 8 and more every cell has its own', () => {
    for (const count of [1, 6, 7]) {
      const { unmount } = wall({ board: boardOf(count) });
      expect(screen.getAllByText('now')).toHaveLength(1);
      expect(screen.getByText('16:00')).toBeTruthy();
      unmount();
    }
    for (const count of [8, 14, 20]) {
      const { unmount } = wall({ board: boardOf(count) });
      expect(screen.queryByText('now')).toBeNull();
      unmount();
    }
  });

  it('of 20 says how many are not shown and when the next of them is ready', () => {
    wall({ board: boardOf(20) });
    // The 15th is the ninth of the later ones: 18:00 and eight times ten minutes.
    expect(screen.getByText('and 6 more, next at 19:20')).toBeTruthy();
  });

  it('rows are 150 px high up to six and 133 for seven, so that all end above the foot of the picture', () => {
    const heights = (count: number) => {
      const { unmount } = wall({ board: boardOf(count) });
      const found = screen.getAllByRole('listitem').map((row) => row.style.height);
      unmount();
      return [...new Set(found)];
    };
    expect(heights(6)).toEqual(['150px']);
    expect(heights(7)).toEqual(['133px']);
    expect(heights(14)).toEqual(['139px']);
    expect(92 + 56 + 6 * 150).toBeLessThanOrEqual(1080);
    expect(92 + 56 + 7 * 133).toBeLessThanOrEqual(1080);
    expect(92 + 6 + 7 * 139).toBeLessThanOrEqual(1080);
  });

  it('counts what wants a hand', () => {
    wall({});
    expect(screen.getByText('6 charges, 1 overdue, 1 check due')).toBeTruthy();
  });
});

describe('what a row says', () => {
  it('is the words of the drawings, for those who see and those who hear', () => {
    wall({});
    expect(rows()).toEqual([
      'R-2406, Overdue, B2 · Bram, 22 min, over, now 14:55',
      'R-2409, Check due, A1 · Ines, 12 min, check waiting',
      'R-2412, Resting, Suri, 14:25, 14:18–14:50',
      'R-2411, Charging, A2 · Ines, 15:30, 15:15–15:55',
      'R-2418, Queued, B1 · Ines, 17:05, 16:40–18:05',
      'R-2415, Discharging, C2 · Ines, 17:20, 16:55–18:05',
    ]);
    const first = within(screen.getAllByRole('listitem')[0]!);
    // The block stands twice, for the swap of its tone.
    expect(first.getAllByText('Overdue')).toHaveLength(2);
    for (const word of ['B2 · Bram', 'over, now 14:55']) expect(first.getByText(word)).toBeTruthy();
  });

  it('names the day of a finish that is not today', () => {
    const tomorrow = (clock: string) => new Date(at(clock) + 86_400_000).toISOString();
    const late = card('R-2430', 'charging', null, {
      ready: { early: tomorrow('08:10'), likely: tomorrow('09:00'), late: tomorrow('10:20') },
    });
    expect(timeOf(wallCards([late])[0]!, { now, boardAt: now, zone })).toEqual({
      large: '09:00',
      small: 'Wed 08:10–10:20',
    });
  });

  it('lets the finish of a held charge move with the clock', () => {
    const held = card('R-2417', 'held', ['16:25', '16:40', '17:40'], { heldAt: new Date(at('13:30')).toISOString() });
    const time = (clock: string) => timeOf(wallCards([held])[0]!, { now: at(clock), boardAt: now, zone });
    expect(time('13:42').large).toBe('16:40');
    expect(time('14:02')).toEqual({ large: '17:00', small: '16:45–18:00' });
  });

  it('counts a long wait in hours', () => {
    const waiting = card('R-2409', 'check-due', null, { checkDueAt: new Date(at('12:20')).toISOString() });
    expect(timeOf(wallCards([waiting])[0]!, { now, boardAt: now, zone })).toMatchObject({ large: '1:22', unit: 'h' });
  });

  it('keeps charges that are only planned off the wall', () => {
    expect(wallCards([card('R-1', 'planned', null), card('R-2', 'fitted', null)])).toEqual([]);
  });
});

describe('hours and burn-in', () => {
  it('dims outside the hours and on a closed day, not within them', () => {
    const { openToday } = boardOf(0);
    expect([at('07:59'), at('08:00'), at('17:59'), at('18:00')].map((t) => isDim(openToday, t))).toEqual([
      true,
      false,
      false,
      true,
    ]);
    expect(isDim(null, now)).toBe(true);
  });

  it('dims every row but the overdue one', () => {
    wall({ now: at('19:00'), heardAt: at('19:00'), board: boardOf(6, { at: new Date(at('19:00')).toISOString() }) });
    const opacity = screen.getAllByRole('listitem').map((row) => getComputedStyle(row).opacity || '1');
    expect(opacity[0]).toBe('1');
    expect(new Set(opacity.slice(1))).toEqual(new Set(['0.5']));
  });

  it('moves 2 px every ten minutes along a ring of 80 minutes', () => {
    const places = Array.from({ length: 9 }, (_, i) => burnInShift(now + i * 600_000));
    expect(places[8]).toEqual(places[0]);
    for (let i = 0; i < 8; i++) {
      const [a, b] = [places[i]!, places[i + 1]!];
      expect(Math.abs(a.x - b.x) + Math.abs(a.y - b.y)).toBe(2);
    }
    expect(burnInShift(now + 599_999 - (now % 600_000))).toEqual(burnInShift(now));
  });
});

describe('the size of the picture', () => {
  it.each([
    [1920, 1080, 1],
    [3840, 2160, 2],
    [1280, 720, 2 / 3],
    [2560, 1080, 1],
    [1024, 768, 1024 / 1920],
  ])('fits %i × %i and fills it', (width, height, scale) => {
    const stage = stageOf({ width, height });
    expect(stage.scale).toBeCloseTo(scale, 9);
    expect(stage.width).toBeGreaterThanOrEqual(1920 - 1e-9);
    expect(stage.height).toBeGreaterThanOrEqual(1080 - 1e-9);
    expect(stage.width * stage.scale).toBeCloseTo(width, 6);
    expect(stage.height * stage.scale).toBeCloseTo(height, 6);
  });
});
