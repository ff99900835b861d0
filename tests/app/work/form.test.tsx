import { fireEvent, screen, waitFor } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import EditWork from '@/app/(workshop)/work/[id]/edit';
import NewWork from '@/app/(workshop)/work/new';
import { draw, emptyDevice, input, press, problem } from '../charges/bench-of';
import { atClock, brakes, iso, now, workServer, type WorkServer } from './works';

const state = vi.hoisted(() => ({ params: {} as Record<string, string> }));
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => state.params,
}));

let server: WorkServer;
function open(page: React.ReactElement, params: Record<string, string> = {}, answers: object = {}) {
  state.params = params;
  server = workServer('technician');
  Object.assign(server.answers, answers);
  draw(page);
}
const type = async (label: string | RegExp, text: string) =>
  fireEvent.change(await input(label), { target: { value: text } });
const unfold = async () => fireEvent.click(await press('Place, skill, due time and more'));

beforeEach(() => {
  emptyDevice();
  atClock(now);
  vi.mocked(router.back).mockClear();
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe('quick add of other work', () => {
  it('needs a title and minutes: all else is left to be anybody’s, anywhere, whenever', async () => {
    open(<NewWork />, {}, { 'POST /api/work': () => Response.json({ ...brakes, title: 'Hose' }, { status: 201 }) });
    await type('What is to be done', 'Hose');
    await type('Likely', '25 min');
    expect(screen.queryByLabelText('Place')).toBeNull();
    fireEvent.click(await press('Put it on the list'));
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes()[0]?.body).toEqual({
      title: 'Hose',
      likelyMinutes: 25,
      longMinutes: null,
      skillId: null,
      placeId: null,
      priority: 'usual',
      dueAt: null,
      repairId: null,
      splittable: false,
      note: null,
    });
  });

  it('from a repair in bay 4 is for that repair and in that place, and says so before it is unfolded', async () => {
    const repair = { id: 'r16', number: 'R-2416', vehicle: 'Grey van', bay: 'Bay 4', state: 'open', rev: 1 };
    open(
      <NewWork />,
      { repair: 'r16' },
      {
        'GET /api/repairs/r16': () => Response.json(repair),
        'POST /api/work': () => Response.json(brakes, { status: 201 }),
      },
    );
    await screen.findByText(/^As it stands: for R-2416, Grey van, bay 4,/);
    await type('What is to be done', 'Brake bleed');
    await type('Likely', '20');
    fireEvent.click(await press('Put it on the list'));
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes()[0]?.body).toMatchObject({ repairId: 'r16', placeId: 'b4' });
  });

  it('sends the due time of the workshop’s own zone, and keeps a long that is shorter than likely as typed', async () => {
    open(<NewWork />, {}, { 'POST /api/work': () => Response.json(brakes, { status: 201 }) });
    await type('What is to be done', 'Hose');
    await type('Likely', '30');
    await unfold();
    await type('At most, nine times in ten', '20');
    await type('Due', '1630');
    fireEvent.click(screen.getByRole('radio', { name: 'Urgent' }));
    fireEvent.click(await press('Put it on the list'));
    await screen.findByText('Long is shorter than likely. Type the longer one here.');
    expect((await input('At most, nine times in ten')).value).toBe('20');
    expect(server.writes()).toEqual([]);
    await type('At most, nine times in ten', '40');
    fireEvent.click(await press('Put it on the list'));
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes()[0]?.body).toMatchObject({ longMinutes: 40, dueAt: iso('16:30'), priority: 'urgent' });
  });

  it('brings back what was typed on an earlier visit, unfolded', async () => {
    open(<NewWork />);
    await type('What is to be done', 'Coolant');
    await unfold();
    await type('Note', 'the blue one');
    document.body.innerHTML = '';
    open(<NewWork />);
    await screen.findByText('What you typed on an earlier visit is back.');
    expect((await input('What is to be done')).value).toBe('Coolant');
    expect((await input('Note')).value).toBe('the blue one');
  });
});

describe('changing other work', () => {
  it('that somebody else has changed shows both states, and saves over it at the new revision only when told to', async () => {
    open(
      <EditWork />,
      { id: 'w1' },
      {
        'GET /api/work/w1': () => Response.json(brakes),
        'PATCH /api/work/w1': () =>
          problem(412, 'Somebody else has changed this meanwhile.', {
            present: { ...brakes, longMinutes: 45, place: { id: 'k2', name: 'bench 2' }, rev: 9 },
          }),
      },
    );
    await type('Likely', '25');
    fireEvent.click(await press('Save the changes'));
    await screen.findByText('This work was changed by somebody else meanwhile.');
    const row = (name: string) =>
      screen.getAllByRole('row').find((each) => each.textContent?.startsWith(name))?.textContent;
    expect(row('Place')).toBe('Placebench 2bay 4');
    expect(row('Likely')).toBe('Likely2025');
    expect(row('Skill')).toBeUndefined();
    server.answers['PATCH /api/work/w1'] = () => Response.json({ ...brakes, rev: 10 });
    fireEvent.click(await press('Save mine over it'));
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes().map(({ rev }) => rev)).toEqual(['"4"', '"9"']);
  });
});
