import { fireEvent, render, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Place from '@/app/(workshop)/workshop/places/[id]';
import Skill from '@/app/(workshop)/workshop/skills/[id]';
import Staffing from '@/app/(workshop)/workshop/staffing/[id]';
import { ClientProvider } from '@/shared/client/client-provider';
import { queryClient } from '@/shared/client/query-client';
import { rememberSignedIn } from '@/shared/client/session-state';
import type { StaffingDto } from '@/shared/contract/staffing';
import { ToastProvider } from '@/shared/ui/primitives/toast';
import { router } from '../../mocks/expo-router';
import { fakeServer, problem } from './server';

const state = vi.hoisted(() => ({ params: {} as Record<string, string> }));
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => state.params,
}));

const open8to5 = { from: '08:00', to: '17:00' };
const week = [open8to5, open8to5, open8to5, open8to5, open8to5, null, null];
const bram: StaffingDto = {
  person: { id: 'p3', name: 'Bram Teal' },
  hours: null,
  hoursNow: week,
  breaks: [{ from: '12:00', to: '12:30' }],
  daysOff: [],
  skillIds: ['packs'],
  rev: 3,
};
const skills = [
  { id: 'packs', name: 'packs', people: 4, inUse: true, rev: 1 },
  { id: 'brakes', name: 'brakes', people: 2, inUse: false, rev: 2 },
];
const places = [
  { id: 'b1', name: 'bay 1', kind: 'bay', inUse: false, rev: 5 },
  { id: 'b4', name: 'bay 4', kind: 'bay', inUse: true, rev: 1 },
];

let server: ReturnType<typeof fakeServer>;
const open = (page: React.ReactNode, id: string, role: 'manager' | 'technician' = 'manager') => {
  state.params = { id };
  server = fakeServer(role);
  server.answers['GET /api/staffing'] = () => Response.json({ people: [bram], skills, places });
  server.answers['GET /api/workshop'] = () =>
    Response.json({ id: 'w1', name: 'Harbour Lane Traction', zone: 'UTC', workingHours: week, rev: 1 });
  render(
    <ClientProvider>
      <ToastProvider>{page}</ToastProvider>
    </ClientProvider>,
  );
};
const press = async (name: string | RegExp) => fireEvent.click(await screen.findByRole('button', { name }));
const type = (field: HTMLElement, text: string) => fireEvent.change(field, { target: { value: text } });
const inGroup = (name: string) => within(screen.getByRole('group', { name }));

beforeEach(() => {
  queryClient.clear();
  localStorage.clear();
  sessionStorage.clear();
  rememberSignedIn('p1');
  vi.mocked(router.back).mockClear();
});
afterEach(() => vi.unstubAllGlobals());

describe('the hours of a person', () => {
  it('are the workshop’s until own ones are chosen, which begin as those and are sent with breaks, days off and skills', async () => {
    open(<Staffing />, 'p3');
    const workshop = await screen.findByRole('radio', { name: /^The workshop’s hours/ });
    expect(workshop.getAttribute('aria-checked')).toBe('true');
    expect(workshop.textContent).toContain('Mon–Fri\u00a008:00–17:00');
    expect(screen.queryByRole('group', { name: 'Monday' })).toBeNull();

    fireEvent.click(screen.getByRole('radio', { name: /^Own hours/ }));
    fireEvent.click(inGroup('Friday').getByRole('checkbox'));
    type(inGroup('Monday').getByLabelText('To'), '15:00');
    await press('Add days off');
    type(inGroup('Days off 1').getByLabelText('First day'), '2026-12-24');
    type(inGroup('Days off 1').getByLabelText('Note'), 'leave');
    fireEvent.click(screen.getByRole('checkbox', { name: 'brakes' }));
    server.answers['PATCH /api/staffing/p3'] = (body) => Response.json({ ...bram, ...(body as object), rev: 4 });
    await press('Save hours and skills');
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    const [write] = server.writes();
    expect(write?.rev).toContain('3');
    expect(write?.body).toEqual({
      hours: [{ from: '08:00', to: '15:00' }, open8to5, open8to5, open8to5, null, null, null],
      breaks: [{ from: '12:00', to: '12:30' }],
      // One day, where no last one is typed.
      daysOff: [{ from: '2026-12-24', to: '2026-12-24', note: 'leave' }],
      skillIds: ['packs', 'brakes'],
    });
  });

  it('keep a break that ends before it begins as typed, and say so at its end', async () => {
    open(<Staffing />, 'p3');
    await screen.findByRole('group', { name: 'Break 1' });
    type(inGroup('Break 1').getByLabelText('To'), '11:30');
    await press('Save hours and skills');
    await screen.findByText('The break ends before it begins.');
    expect(inGroup('Break 1').getByLabelText<HTMLInputElement>('To').value).toBe('11:30');
    expect(server.writes()).toEqual([]);
  });

  it('lose the break that is removed and keep the other one', async () => {
    open(<Staffing />, 'p3');
    await press('Add a break');
    type(inGroup('Break 2').getByLabelText('From'), '15:00');
    type(inGroup('Break 2').getByLabelText('To'), '15:15');
    await press('Remove break 1');
    server.answers['PATCH /api/staffing/p3'] = (body) => Response.json({ ...bram, ...(body as object), rev: 4 });
    await press('Save hours and skills');
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes()[0]?.body).toMatchObject({ hours: null, breaks: [{ from: '15:00', to: '15:15' }] });
  });

  it('changed by somebody else meanwhile stand beside what is typed, and are saved over only when told to', async () => {
    open(<Staffing />, 'p3');
    server.answers['PATCH /api/staffing/p3'] = () =>
      problem(412, 'Somebody else has changed this meanwhile.', {
        present: { ...bram, breaks: [{ from: '12:30', to: '13:00' }], rev: 8 },
      });
    fireEvent.click(await screen.findByRole('checkbox', { name: 'brakes' }));
    await press('Save hours and skills');
    await screen.findByText('What is known of Bram Teal was changed by somebody else meanwhile.');
    const row = (name: string) =>
      screen.getAllByRole('row').find((each) => each.textContent?.startsWith(name))?.textContent;
    expect(row('Breaks')).toBe('Breaks12:30–13:0012:00–12:30');
    expect(row('Skills')).toBe('Skillspackspacks, brakes');
    expect(row('Days off')).toBeUndefined();
    server.answers['PATCH /api/staffing/p3'] = (body) => Response.json({ ...bram, ...(body as object), rev: 9 });
    await press('Save mine over it');
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes().at(-1)?.rev).toContain('8');
  });

  it('are not for a technician: who can is named', async () => {
    open(<Staffing />, 'p3', 'technician');
    await screen.findByText('Hours, days off and skills are changed by a manager.');
    expect(await screen.findByText('Here that is Hella Brandt.')).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Save hours and skills' })).toBeNull();
  });
});

describe('a skill', () => {
  it('that work asks for cannot be removed, and says why', async () => {
    open(<Skill />, 'packs');
    await screen.findByText('Work that is not over asks for it. Change that work first.');
    await press('Remove the skill');
    expect(screen.queryByText('Remove packs?')).toBeNull();
  });

  it('that nobody asks for goes after a confirm step, with the revision it was seen at', async () => {
    open(<Skill />, 'brakes');
    server.answers['DELETE /api/skills/brakes'] = () => new Response(null, { status: 204 });
    await press('Remove the skill');
    fireEvent.click((await screen.findAllByRole('button', { name: 'Remove the skill' })).at(-1)!);
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes()[0]).toMatchObject({ method: 'DELETE', path: '/api/skills/brakes' });
    expect(server.writes()[0]?.rev).toContain('2');
  });

  it('with a name that is on the list already is refused at the name', async () => {
    open(<Skill />, 'new');
    const sentence = 'There is a skill called brakes already. Choose another name.';
    server.answers['POST /api/skills'] = () => problem(409, sentence, { fields: { name: sentence } });
    type(await screen.findByLabelText('Name'), 'brakes');
    await press('Save the skill');
    await screen.findByText(sentence);
    expect(screen.getByLabelText('Name').getAttribute('aria-invalid')).toBe('true');
    expect(router.back).not.toHaveBeenCalled();
  });
});

describe('a place', () => {
  it('is saved as the bench that was chosen', async () => {
    open(<Place />, 'new');
    server.answers['POST /api/places'] = (body) =>
      Response.json({ id: 'n', inUse: false, rev: 1, ...(body as object) });
    type(await screen.findByLabelText('Name'), 'bench 2');
    fireEvent.click(screen.getByRole('radio', { name: 'Bench' }));
    await press('Save the place');
    await waitFor(() => expect(router.back).toHaveBeenCalledOnce());
    expect(server.writes()[0]?.body).toEqual({ name: 'bench 2', kind: 'bench' });
  });

  it('that work has come to need meanwhile stays, with the server’s sentence', async () => {
    open(<Place />, 'b1');
    const sentence = 'W-0012 needs bay 1. Give it another place first.';
    server.answers['DELETE /api/places/b1'] = () => problem(409, sentence);
    await press('Remove the place');
    fireEvent.click((await screen.findAllByRole('button', { name: 'Remove the place' })).at(-1)!);
    await screen.findByText(sentence);
    expect(router.back).not.toHaveBeenCalled();
  });

  it('can be read by a technician, who is told who may change it', async () => {
    open(<Place />, 'b4', 'technician');
    await screen.findByText('Changed by a manager. Here that is Hella Brandt.');
    expect(screen.getByLabelText<HTMLInputElement>('Name').readOnly).toBe(true);
    expect(screen.queryByRole('button', { name: 'Remove the place' })).toBeNull();
  });
});
