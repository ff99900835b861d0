import { fireEvent, render, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Limits from '@/app/(workshop)/workshop/limits';
import { ClientProvider } from '@/shared/client/client-provider';
import { queryClient } from '@/shared/client/query-client';
import { rememberSignedIn } from '@/shared/client/session-state';
import { ToastProvider } from '@/shared/ui/primitives/toast';
import { router } from '../../mocks/expo-router';
import { fakeServer, problem } from './server';

const workshop = {
  id: 'w1',
  name: 'Harbour Lane Traction',
  zone: 'UTC',
  workingHours: [null, null, null, null, null, null, null],
  toleranceMillivolts: 5,
  minRestMinutes: 60,
  lookInMinutes: 60,
  inrushLimitC: 1,
  lagLimitMillivolts: 20,
  passOnTellMinutes: 0,
  passOnAmberMinutes: 10,
  passOnAlarmMinutes: 5,
  rev: 4,
};

let server: ReturnType<typeof fakeServer>;
const open = (role: 'manager' | 'technician') => {
  server = fakeServer(role);
  server.answers['GET /api/workshop'] = () => Response.json(workshop);
  render(
    <ClientProvider>
      <ToastProvider>
        <Limits />
      </ToastProvider>
    </ClientProvider>,
  );
};
const field = (label: string) => screen.findByLabelText<HTMLInputElement>(label);
const type = async (label: string, text: string) => fireEvent.change(await field(label), { target: { value: text } });
const save = () => fireEvent.click(screen.getByRole('button', { name: 'Save the limits' }));

beforeEach(() => {
  queryClient.clear();
  localStorage.clear();
  sessionStorage.clear();
  rememberSignedIn('p1');
  vi.mocked(router.back).mockClear();
});
afterEach(() => vi.unstubAllGlobals());

describe('the limits of the workshop', () => {
  it('refuses 80 mV of tolerance at its field, keeps it there, and sends nothing', async () => {
    open('manager');
    await type('Tolerance', '80');
    save();
    await screen.findByText(/^80\s?mV is over 50\s?mV, the most for this\./);
    expect((await field('Tolerance')).value).toBe('80');
    expect(document.activeElement).toBe(await field('Tolerance'));
    expect(screen.getByText('One field needs a change.')).toBeTruthy();
    expect(server.writes()).toEqual([]);
  });

  it('sends a comma as a decimal mark with the revision it began from, and goes back', async () => {
    open('manager');
    server.answers['PATCH /api/workshop'] = () => Response.json({ ...workshop, toleranceMillivolts: 4.5, rev: 5 });
    await type('Tolerance', '4,5 mV');
    save();
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    const [write] = server.writes();
    expect(write?.body).toMatchObject({ toleranceMillivolts: 4.5, minRestMinutes: 60 });
    expect(write?.rev).toContain('4');
  });

  it('shows what somebody else saved beside what is typed, and saves over it only when told to', async () => {
    open('manager');
    const theirs = { ...workshop, toleranceMillivolts: 3, lagLimitMillivolts: 25, rev: 9 };
    server.answers['PATCH /api/workshop'] = () =>
      problem(412, 'Somebody else has changed this meanwhile.', { present: theirs });
    await type('Tolerance', '7');
    save();
    await screen.findByText('The workshop was changed by somebody else meanwhile.');
    const row = (name: string) =>
      screen.getAllByRole('row').find((each) => each.textContent?.startsWith(name))?.textContent;
    expect(row('Tolerance')).toBe('Tolerance37');
    expect(row('Lag limit')).toBe('Lag limit2520');
    expect(row('Rest at least')).toBeUndefined();
    expect((await field('Tolerance')).value).toBe('7');

    server.answers['PATCH /api/workshop'] = () => Response.json({ ...workshop, rev: 10 });
    fireEvent.click(screen.getByRole('button', { name: 'Save mine over it' }));
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes().at(-1)?.rev).toContain('9');
  });

  it('takes what stands now into the fields when that is chosen', async () => {
    open('manager');
    server.answers['PATCH /api/workshop'] = () =>
      problem(412, 'Somebody else has changed this meanwhile.', {
        present: { ...workshop, toleranceMillivolts: 3, rev: 9 },
      });
    await type('Tolerance', '7');
    save();
    fireEvent.click(await screen.findByRole('button', { name: 'Take what stands now' }));
    await waitFor(async () => expect((await field('Tolerance')).value).toBe('3'));
    expect(screen.queryByText('The workshop was changed by somebody else meanwhile.')).toBeNull();
  });

  it('keeps what was typed without a connection, and brings it back on the next visit', async () => {
    open('manager');
    await type('Look-in every', '45');
    save();
    await screen.findByText(/^No connection to the server/);
    expect((await field('Look-in every')).value).toBe('45');
    document.body.innerHTML = '';
    open('manager');
    await screen.findByText('What you typed on an earlier visit is back.');
    expect((await field('Look-in every')).value).toBe('45');
  });

  it('lets a technician decide between two sources only once that is ticked, and saves it so', async () => {
    open('manager');
    server.answers['PATCH /api/workshop'] = () => Response.json({ ...workshop, technicianDecides: true, rev: 5 });
    const tick = await screen.findByRole('checkbox', { name: /^A technician may decide between two sources/ });
    expect(tick.getAttribute('aria-checked')).toBe('false');
    fireEvent.click(tick);
    save();
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes()[0]?.body).toMatchObject({ technicianDecides: true, toleranceMillivolts: 5 });
  });

  it('takes 5 min for a look-in and 60 for a fit until they are set, and sends what was typed', async () => {
    open('manager');
    server.answers['PATCH /api/workshop'] = () => Response.json({ ...workshop, rev: 5 });
    expect((await field('A look-in takes')).value).toBe('5');
    expect((await field('A fit takes')).value).toBe('60');
    await type('A fit takes', '45');
    save();
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes()[0]?.body).toMatchObject({ lookInVisitMinutes: 5, fitMinutes: 45 });
  });

  it('is for reading only to a technician, and says who may change it', async () => {
    open('technician');
    await screen.findByText('Changed by a manager. Here that is Hella Brandt.');
    expect((await field('Tolerance')).readOnly).toBe(true);
    expect(screen.queryByRole('button', { name: 'Save the limits' })).toBeNull();
    const tick = screen.getByRole('checkbox', { name: /^A technician may decide/ });
    fireEvent.click(tick);
    expect(tick.getAttribute('aria-checked')).toBe('false');
  });
});
