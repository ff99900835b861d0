import { act, fireEvent, render, screen, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { LevelColumn } from '@/shared/ui/level-column/level-column';
import { Duration, Num } from '@/shared/ui/primitives/num';
import { OfflineStrip } from '@/shared/ui/primitives/offline-strip';
import { Table, type Column } from '@/shared/ui/primitives/table';
import { StageTag } from '@/shared/ui/stage/stage-tag';
import { stageGlyphs, stages, type StageMark } from '@/shared/ui/stage/stages';
import { Loading } from '@/shared/ui/states/loading';
import { ThemeProvider, useTheme } from '@/shared/ui/theme/theme';
import { WaitRibbon } from '@/shared/ui/wait-ribbon/wait-ribbon';
import { useSurface, Surface } from '@/shared/ui/theme/surface';

const plain = (text: string | null | undefined) => text?.replaceAll('\u00a0', ' ');

describe('drawings for readers', () => {
  it('names a column by its words, or hides it where the words stand beside it', () => {
    const column = { groups: [{ volts: 3.61 }], targetVolts: 3.968, place: 'list', stage: 'queued' } as const;
    render(<LevelColumn {...column} name="S-0417" />);
    expect(plain(screen.getByRole('img').getAttribute('aria-label'))).toBe(
      'S-0417: Queued. Target 3.968 V, ±5 mV. G1 3.610 V.',
    );
    const { container } = render(<LevelColumn {...column} twin="" />);
    expect(container.querySelector('svg')?.getAttribute('aria-hidden')).toBe('true');
  });

  it('gives two ribbons clip paths of their own', () => {
    const ribbon = {
      segments: [{ kind: 'cc' as const, fromS: 0, toS: 100 }],
      fromS: 0,
      toS: 200,
      width: 100,
      height: 20,
      nowS: 50,
      twin: 'x',
    };
    const { container } = render(
      <>
        <WaitRibbon {...ribbon} />
        <WaitRibbon {...ribbon} />
      </>,
    );
    const ids = [...container.querySelectorAll('clipPath')].map((path) => path.id);
    expect(new Set(ids).size).toBe(2);
    for (const id of ids) expect(container.querySelector(`[clip-path="url(#${id})"]`)).toBeTruthy();
  });

  it('never shows a stage without its word and its own silhouette', () => {
    const marks = Object.keys(stages) as StageMark[];
    expect(new Set(marks.map((mark) => stageGlyphs[mark].d)).size).toBe(marks.length);
    for (const mark of marks) {
      const { container, unmount } = render(<StageTag stage={mark} />);
      expect(container.textContent).toBe(stages[mark].word);
      expect(container.querySelector('path')?.getAttribute('d')).toBe(stageGlyphs[mark].d);
      unmount();
    }
  });
});

describe('numerals', () => {
  it('read and copy as 3 h 05 and 3.968 V, although their parts differ in size', () => {
    const { container } = render(<Duration seconds={185 * 60} />);
    expect(plain(container.textContent)).toBe('3 h 05');
    const volts = render(<Num value="3.968" unit="V" />);
    expect(plain(volts.container.textContent)).toBe('3.968 V');
    const minutes = render(<Duration seconds={55 * 60} />);
    expect(plain(minutes.container.textContent)).toBe('55 min');
  });
});

describe('theme', () => {
  const Probe = () => {
    const { name, colors } = useTheme();
    return <>{`${name} ${colors.ground} ${useSurface()}`}</>;
  };
  it('gives the chosen theme, and drawings the tone of what they stand on', () => {
    const { container } = render(
      <ThemeProvider choice="night">
        <Surface tone="sheet">
          <Probe />
        </Surface>
      </ThemeProvider>,
    );
    expect(container.textContent).toBe('night #0C1113 sheet');
    expect(document.documentElement.style.colorScheme).toBe('dark');
  });

  it('lets the innermost provider dress the page, and gives it back when that one goes', () => {
    const page = (wall: boolean) => (
      <ThemeProvider choice="paper">
        {wall ? <ThemeProvider choice="night">wall</ThemeProvider> : 'bench'}
      </ThemeProvider>
    );
    const { rerender, unmount } = render(page(true));
    expect(document.documentElement.style.colorScheme).toBe('dark');
    rerender(page(false));
    expect(document.documentElement.style.colorScheme).toBe('light');
    unmount();
  });
});

describe('OfflineStrip', () => {
  it('says since when, and how many readings wait', () => {
    const { container, rerender } = render(<OfflineStrip since="13:21" waiting={2} />);
    expect(container.textContent).toBe(
      'No connection since 13:21. Readings you log are kept on this phone: 2 waiting.',
    );
    rerender(<OfflineStrip since="13:21" waiting={0} />);
    expect(container.textContent).toBe('No connection since 13:21. Readings you log are kept on this phone.');
  });
});

describe('Loading', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => void vi.useRealTimers());

  it('shows nothing for 300 ms, then bars, and after 8 s a way to try again', () => {
    const retry = vi.fn();
    render(<Loading what="the bench" onRetry={retry} />);
    act(() => vi.advanceTimersByTime(299));
    expect(screen.queryByRole('status')).toBeNull();
    act(() => vi.advanceTimersByTime(2));
    expect(screen.getByRole('status').textContent).toBe('Loading the bench');
    expect(screen.queryByRole('button')).toBeNull();
    act(() => vi.advanceTimersByTime(7700));
    expect(screen.getByText('Still loading the bench.')).toBeTruthy();
    fireEvent.click(screen.getByRole('button', { name: 'Try again' }));
    expect(retry).toHaveBeenCalledTimes(1);
  });
});

describe('Table', () => {
  interface Person {
    name: string;
    role: string;
    seen: string;
  }
  const rows: Person[] = [
    { name: 'Petra', role: 'Manager', seen: '12:10' },
    { name: 'Hella', role: 'Foreman', seen: '13:41' },
  ];
  const columns: Column<Person>[] = [
    { key: 'name', title: 'Name', cell: (row) => row.name },
    { key: 'role', title: 'Role', cell: (row) => row.role },
    { key: 'seen', title: 'Seen', numeric: true, cell: (row) => row.seen },
  ];
  const open = vi.fn();
  const table = (
    <Table
      label="People"
      columns={columns}
      rows={rows}
      rowKey={(row) => row.name}
      onOpen={open}
      rowLabel={(row) => row.name}
    />
  );
  // The web renderer reads the width of the root element when the window tells a change.
  const setWidth = (width: number) =>
    act(() => {
      Object.defineProperty(document.documentElement, 'clientWidth', { configurable: true, value: width });
      window.dispatchEvent(new Event('resize'));
    });

  it('is a table with column headings on the desk, its rows walked by arrow keys and opened by Enter', () => {
    setWidth(1440);
    render(table);
    const grid = screen.getByRole('table', { name: 'People' });
    expect(
      within(grid)
        .getAllByRole('columnheader')
        .map((head) => head.textContent),
    ).toEqual(['Name', 'Role', 'Seen']);
    const [, first, second] = within(grid).getAllByRole('row');
    expect(
      within(first!)
        .getAllByRole('cell')
        .map((cell) => cell.textContent),
    ).toEqual(['Petra', 'Manager', '12:10']);
    first?.focus();
    fireEvent.keyDown(first!, { key: 'ArrowDown' });
    expect(document.activeElement).toBe(second);
    fireEvent.keyDown(second!, { key: 'Enter' });
    fireEvent.keyUp(second!, { key: 'Enter' });
    expect(open).toHaveBeenCalledExactlyOnceWith(rows[1]);
  });

  it('becomes rows on the phone: name first, detail under it, number at the right', () => {
    setWidth(390);
    render(table);
    expect(screen.queryByRole('table')).toBeNull();
    const items = within(screen.getByRole('list', { name: 'People' })).getAllByRole('listitem');
    expect(items.map((item) => item.textContent)).toEqual(['PetraManager12:10', 'HellaForeman13:41']);
  });
});
