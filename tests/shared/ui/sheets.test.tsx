import { act, fireEvent, render, screen, within } from '@testing-library/react';
import { useState } from 'react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { BottomSheet } from '@/shared/ui/primitives/bottom-sheet';
import { Button } from '@/shared/ui/primitives/button';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { AlertRegion } from '@/shared/ui/primitives/live-region';
import { ToastProvider, useToast } from '@/shared/ui/primitives/toast';

function Bench({ scrimCloses }: { scrimCloses?: boolean }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button title="Log a reading" onPress={() => setOpen(true)} />
      <BottomSheet
        open={open}
        onClose={() => setOpen(false)}
        title="Log a reading"
        aside="13:42"
        scrimCloses={scrimCloses}
        actions={<Button title="Save" onPress={() => setOpen(false)} />}
      >
        <Button title="Inside" onPress={() => {}} />
      </BottomSheet>
    </>
  );
}

async function openSheet() {
  const opener = screen.getByRole('button', { name: 'Log a reading' });
  opener.focus();
  await act(async () => fireEvent.click(opener));
  return screen.getByRole('dialog', { name: 'Log a reading' });
}

describe('BottomSheet', () => {
  it('is a modal dialog named by its title', async () => {
    render(<Bench />);
    const dialog = await openSheet();
    expect(dialog.getAttribute('aria-modal')).toBe('true');
    expect(within(dialog).getByRole('heading', { level: 2, name: 'Log a reading' })).toBeTruthy();
  });

  it('takes the focus in when it opens and gives it back when it closes', async () => {
    render(<Bench />);
    const dialog = await openSheet();
    expect(dialog.contains(document.activeElement)).toBe(true);
    await act(async () => fireEvent.click(within(dialog).getByRole('button', { name: 'Close' })));
    expect(screen.queryByRole('dialog')).toBeNull();
    expect(document.activeElement).toBe(screen.getByRole('button', { name: 'Log a reading' }));
  });

  it('brings the focus back when it tries to leave', async () => {
    render(<Bench />);
    const dialog = await openSheet();
    act(() => within(dialog).getByRole('button', { name: 'Save' }).focus());
    act(() => screen.getAllByRole('button', { name: 'Log a reading', hidden: true })[0]?.focus());
    expect(dialog.contains(document.activeElement)).toBe(true);
  });

  it('closes on Escape', async () => {
    render(<Bench />);
    await openSheet();
    await act(async () => fireEvent.keyUp(document, { key: 'Escape' }));
    expect(screen.queryByRole('dialog')).toBeNull();
  });

  it('closes on the scrim, unless a stray tap would lose something', async () => {
    const { unmount } = render(<Bench />);
    const scrim = (dialog: HTMLElement) => dialog.querySelector('[aria-hidden="true"]');
    let dialog = await openSheet();
    await act(async () => fireEvent.click(scrim(dialog)!));
    expect(screen.queryByRole('dialog')).toBeNull();
    unmount();
    render(<Bench scrimCloses={false} />);
    dialog = await openSheet();
    await act(async () => fireEvent.click(scrim(dialog)!));
    expect(screen.getByRole('dialog')).toBeTruthy();
  });

  it('draws nothing while it is closed', () => {
    render(<Bench />);
    expect(screen.queryByText('Inside')).toBeNull();
  });
});

describe('ConfirmSheet', () => {
  it('stands the safe choice last, nearest the thumb, and waits for a reason', async () => {
    const confirm = vi.fn();
    const sheet = (ready: boolean) => (
      <ConfirmSheet
        open
        title="Stop the charge of S-0398"
        confirm="It is off: stop the charge"
        safe="Let it run"
        why="Say why first."
        ready={ready}
        onConfirm={confirm}
        onClose={() => {}}
      />
    );
    const { rerender } = render(sheet(false));
    expect(screen.getAllByRole('button').map((button) => button.textContent)).toEqual([
      'It is off: stop the charge',
      'Let it run',
    ]);
    expect(screen.getByText('Say why first.')).toBeTruthy();
    fireEvent.click(screen.getByRole('button', { name: 'It is off: stop the charge' }));
    expect(confirm).not.toHaveBeenCalled();
    rerender(sheet(true));
    fireEvent.click(screen.getByRole('button', { name: 'It is off: stop the charge' }));
    expect(confirm).toHaveBeenCalledTimes(1);
  });
});

describe('AlertRegion', () => {
  const a = { id: 'a', text: 'R-2406 is overdue' };
  const b = { id: 'b', text: 'No reading from A2 for 25 min' };

  it('reads each new alert once, and none of those that were there at the start', () => {
    const { rerender } = render(<AlertRegion alerts={[a]} />);
    const region = screen.getByRole('alert');
    expect(region.getAttribute('aria-live')).toBe('assertive');
    expect(region.textContent).toBe('');
    rerender(<AlertRegion alerts={[a, b]} />);
    expect(region.textContent).toBe('No reading from A2 for 25 min');
    rerender(<AlertRegion alerts={[b]} />);
    rerender(<AlertRegion alerts={[a, b]} />);
    expect(region.textContent).toBe('No reading from A2 for 25 min');
  });
});

describe('Toast', () => {
  afterEach(() => void vi.useRealTimers());
  const back = vi.fn();
  function Saver() {
    const toast = useToast();
    return (
      <Button
        title="Save"
        onPress={() => toast({ text: 'Reading logged at 13:42.', action: { title: 'Take it back', onPress: back } })}
      />
    );
  }

  it('is read politely from a region that stood there before, and goes by itself', () => {
    vi.useFakeTimers();
    render(
      <ToastProvider>
        <Saver />
      </ToastProvider>,
    );
    const region = screen.getByRole('status');
    expect(region.textContent).toBe('');
    fireEvent.click(screen.getByRole('button', { name: 'Save' }));
    expect(region.textContent).toBe('Reading logged at 13:42.');
    act(() => vi.advanceTimersByTime(11_999));
    expect(screen.getByRole('button', { name: 'Take it back' })).toBeTruthy();
    act(() => vi.advanceTimersByTime(2));
    expect(screen.queryByRole('button', { name: 'Take it back' })).toBeNull();
  });

  it('acts once and closes', () => {
    render(
      <ToastProvider>
        <Saver />
      </ToastProvider>,
    );
    fireEvent.click(screen.getByRole('button', { name: 'Save' }));
    fireEvent.click(screen.getByRole('button', { name: 'Take it back' }));
    expect(back).toHaveBeenCalledTimes(1);
    expect(screen.queryByRole('button', { name: 'Take it back' })).toBeNull();
  });
});
