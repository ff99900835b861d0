import { act, fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { emptyDevice, problem } from '../charges/bench-of';
import { open, part, server, writes } from './open-plan';
import { iso, now } from './plan-of';

beforeEach(() => {
  emptyDevice();
  vi.useFakeTimers({ now, toFake: ['Date'] });
});
afterEach(() => {
  vi.useRealTimers();
  vi.restoreAllMocks();
  vi.unstubAllGlobals();
});

describe('moving a charge', () => {
  const charge = () => screen.findByRole('button', { name: /^R-2421 on A1/ });

  it('by tap: its places are shown with ready time and lateness, the soonest is preset, and one tap moves it', async () => {
    open();
    fireEvent.click(await charge());
    const panel = await part('Move R-2421');
    const c1 = await panel.findByRole('radio', { name: /C1/ });
    expect(c1.textContent).toMatch(/from 13:45, ready 15:05 \(14:55–15:20\), on time/);
    expect(panel.getByRole('radio', { name: /A2/ }).textContent).toMatch(/40\smin late/);
    expect(panel.getByRole('radio', { name: /C2/ }).getAttribute('aria-disabled')).toBe('true');
    fireEvent.click(c1);
    expect((await panel.findByLabelText<HTMLInputElement>('Clip on')).value).toBe('13:45');
    fireEvent.click(panel.getByRole('button', { name: 'Move R-2421 to C1 at 13:45' }));
    await waitFor(() =>
      expect(writes('/api/bench-plan/move')[0]?.body).toEqual({
        chargeId: 'R-2421',
        rev: 1,
        channelId: 'c1',
        clipOnAt: iso('13:45'),
      }),
    );
    fireEvent.click(await screen.findByRole('button', { name: 'Undo' }));
    await waitFor(() => expect(writes('/api/bench-plan/undo/change-2')).toHaveLength(1));
  });

  it('by keys: Enter picks, arrows go down over closed channels and a quarter later, Enter moves', async () => {
    open();
    const button = await charge();
    fireEvent.click(button);
    await (await part('Move R-2421')).findByRole('radio', { name: /C1/ });
    fireEvent.keyDown(button, { key: 'ArrowDown' });
    fireEvent.keyDown(button, { key: 'ArrowDown' });
    fireEvent.keyDown(button, { key: 'ArrowRight' });
    // 14:45 is kept on A2 until its soonest 15:45, and from there on C1.
    expect(await screen.findByText('C1 at 16:00, ready 17:20, on time')).toBeTruthy();
    fireEvent.keyDown(button, { key: 'Enter' });
    await waitFor(() =>
      expect(writes('/api/bench-plan/move')[0]?.body).toMatchObject({ channelId: 'c1', clipOnAt: iso('16:00') }),
    );
  });

  it('is left by Escape with nothing sent', async () => {
    open();
    const button = await charge();
    fireEvent.click(button);
    await part('Move R-2421');
    fireEvent.keyDown(button, { key: 'Escape' });
    await waitFor(() => expect(screen.queryByRole('region', { name: 'Move R-2421' })).toBeNull());
    expect(server.writes()).toEqual([]);
  });

  it('by a time that is typed: one before the soonest is refused beside the field, a later one is taken', async () => {
    open();
    fireEvent.click(await charge());
    const panel = await part('Move R-2421');
    const field = await panel.findByLabelText<HTMLInputElement>('Clip on');
    fireEvent.change(field, { target: { value: '13:10' } });
    expect(await panel.findByText('The soonest there is 14:00.')).toBeTruthy();
    fireEvent.change(field, { target: { value: '1530' } });
    await waitFor(() => expect(panel.queryByText('The soonest there is 14:00.')).toBeNull());
    fireEvent.click(panel.getByRole('button', { name: 'Move R-2421 to A1 at 15:30' }));
    await waitFor(() => expect(writes('/api/bench-plan/move')[0]?.body).toMatchObject({ clipOnAt: iso('15:30') }));
  });

  it('refused because the channel was taken says by what, keeps the choice and reads the plan again', async () => {
    open();
    server.answers['POST /api/bench-plan/move'] = () => problem(409, 'C1 was taken by R-2440 at 13:43.');
    fireEvent.click(await charge());
    const panel = await part('Move R-2421');
    fireEvent.click(await panel.findByRole('radio', { name: /C1/ }));
    fireEvent.click(panel.getByRole('button', { name: 'Move R-2421 to C1 at 13:45' }));
    expect(await panel.findByText(/^C1 was taken by R-2440 at 13:43\./)).toBeTruthy();
    expect(panel.getByRole('radio', { name: /C1/ }).getAttribute('aria-checked')).toBe('true');
    await waitFor(() =>
      expect(server.sent.filter(({ path }) => path === '/api/bench-plan?days=1').length).toBeGreaterThan(1),
    );
  });

  it('refused because somebody changed the charge says that the plan shows what is there now', async () => {
    open();
    server.answers['POST /api/bench-plan/move'] = () => problem(412, 'Ines moved R-2421 at 13:41.');
    fireEvent.click(await charge());
    const panel = await part('Move R-2421');
    fireEvent.click(await panel.findByRole('radio', { name: /C1/ }));
    fireEvent.click(panel.getByRole('button', { name: 'Move R-2421 to C1 at 13:45' }));
    expect(
      await panel.findByText('Ines moved R-2421 at 13:41. The plan shows what is there now: look again, then decide.'),
    ).toBeTruthy();
  });

  it('of one that has begun says why it stays', async () => {
    open();
    fireEvent.click(await screen.findByRole('button', { name: /^R-2411 on A2/ }));
    const panel = await part('Move R-2411');
    expect(panel.getByText('R-2411 has begun: it stays where it is.')).toBeTruthy();
    expect(panel.queryByRole('radio')).toBeNull();
  });

  it('with the mouse: drawn 60 min later it is moved there when it is let go, and the click after it picks nothing', async () => {
    open();
    const button = await charge();
    fireEvent.click(button);
    await (await part('Move R-2421')).findByRole('radio', { name: /C1/ });
    const lane = button.closest('[role=list]')!.parentElement!;
    vi.spyOn(lane, 'getBoundingClientRect').mockReturnValue({ top: 0, bottom: 84 } as DOMRect);
    const mouse = { pointerType: 'mouse', button: 0, pointerId: 1, clientY: 40 };
    const send = (type: string, clientX: number) => {
      // jsdom has no pointer events of its own: the fields are put on a plain one.
      const event = new MouseEvent(type, { bubbles: true, cancelable: true, clientX, clientY: 40, button: 0 });
      Object.assign(event, { pointerType: mouse.pointerType, pointerId: 1 });
      act(() => void button.dispatchEvent(event));
    };
    // 872 px are 10 h 30: an hour is 83 px.
    send('pointerdown', 600);
    send('pointermove', 683);
    send('pointerup', 683);
    fireEvent.click(button);
    await waitFor(() =>
      expect(writes('/api/bench-plan/move')[0]?.body).toMatchObject({ channelId: 'a1', clipOnAt: iso('15:45') }),
    );
  });
});
