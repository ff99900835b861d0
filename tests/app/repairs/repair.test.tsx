import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Repair from '@/app/(workshop)/repairs/[id]/index';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { Role } from '@/shared/contract/roles';
import { nextOfRepair } from '@/shared/ui/repair/repair-next';
import { unrecorded } from '@/shared/ui/repair/repair-words';
import { draw, emptyDevice, press } from '../charges/bench-of';
import { card } from '../wall/cards';
import { fakeServer, problem } from '../workshop/server';
import { readingOf, repairOf } from './repair-of';

const gone = vi.hoisted(() => vi.fn());
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'r1' }),
  useRouter: () => ({ push: gone, replace: gone, back: gone, canGoBack: () => false }),
}));

beforeEach(() => {
  emptyDevice();
  gone.mockClear();
});
afterEach(() => vi.unstubAllGlobals());

function serverOf(present: RepairPageDto, role: Role = 'technician') {
  const server = fakeServer(role);
  server.answers['GET /api/repairs/r1'] = () => Response.json(present);
  return server;
}
const disagree = {
  code: 'sources-disagree',
  text: 'The pack says module 17, your meter says 18.',
  role: 'foreman',
} as const;

describe('the page of a repair', () => {
  it('names step 5 of 7, the spread, the odd module with its volts, and what happened', async () => {
    serverOf(repairOf('charge'));
    draw(<Repair />);
    expect(await screen.findByText('Charge, step 5 of 7')).toBeTruthy();
    expect(screen.getByText('then fit, prove')).toBeTruthy();
    expect(screen.getByRole('button', { name: /Odd: Module 17: G33 3\.871\sV, G34 3\.934\sV/ })).toBeTruthy();
    expect(screen.getByText('booked Grey van')).toBeTruthy();
    expect(screen.getByRole('table', { name: 'Readings of the pack' }).textContent).toContain('7.4');
  });

  it('says what blocks it and who decides to one of the two who may not', async () => {
    serverOf(repairOf('second-source', { block: disagree }));
    draw(<Repair />);
    const box = within(await screen.findByRole('region', { name: 'What blocks it' }));
    expect(box.getByText(disagree.text)).toBeTruthy();
    await waitFor(() => expect(box.getByText(/decided by a foreman or a manager \(Hella Brandt\)/)).toBeTruthy());
    fireEvent.click(await press('Look at the two sources'));
    expect(gone).toHaveBeenCalledWith('/repairs/r1/second-source');
  });

  it('shows an earlier reading in place of the latest by a press on its row', async () => {
    const after = readingOf({
      id: 'g2',
      stage: 'after-fit',
      at: '2026-06-09T13:00:00.000Z',
      odd: [],
      oddPositions: [],
    });
    serverOf(repairOf('prove', { readings: [after, readingOf()] }));
    draw(<Repair />);
    expect(await screen.findByRole('button', { name: /No group stands out/ })).toBeTruthy();
    fireEvent.click(screen.getByRole('row', { name: /Show the reading Arrival/ }));
    expect(screen.getByRole('button', { name: /Odd: Module 17/ })).toBeTruthy();
  });

  it('is handed over with steps missing only with a note, which a refusal leaves standing', async () => {
    const server = serverOf(repairOf('prove'));
    server.answers['POST /api/repairs/r1/hand-over'] = () => problem(409, 'A charge is open for it.');
    draw(<Repair />);
    fireEvent.click(await press('More for this repair'));
    fireEvent.click(await press('Hand it over'));
    fireEvent.click(await press('It is handed over'));
    expect(server.writes()).toEqual([]);
    const note = screen.getByLabelText<HTMLTextAreaElement>('Note');
    fireEvent.change(note, { target: { value: 'Proven at the next service' } });
    fireEvent.click(await press('It is handed over'));
    expect(await screen.findByText('A charge is open for it.')).toBeTruthy();
    expect(server.writes()).toMatchObject([{ body: { note: 'Proven at the next service' } }]);
    expect(note.value).toBe('Proven at the next service');
  });

  it('corrects a wait with its reason, the untouched end to the second, at the revision seen', async () => {
    const wait = {
      id: 'w1',
      from: '2026-06-08T13:00:17.000Z',
      to: '2026-06-08T15:30:42.000Z',
      modulePosition: '17',
      corrected: null,
    };
    const server = serverOf(repairOf('fit', { wait: [wait] }));
    server.answers['PATCH /api/repairs/r1/wait/w1'] = () => Response.json(repairOf('fit', { rev: 5 }));
    draw(<Repair />);
    fireEvent.click(await press(/Correct the wait/));
    fireEvent.change(screen.getByLabelText('From'), { target: { value: '15:30' } });
    fireEvent.change(screen.getByLabelText('Reason'), { target: { value: 'The pack was closed over lunch' } });
    fireEvent.click(await press('Correct it'));
    await waitFor(() => expect(server.writes()).toHaveLength(1));
    expect(server.writes()).toMatchObject([
      {
        rev: '"4"',
        body: { from: '2026-06-08T13:30:00.000Z', to: wait.to, reason: 'The pack was closed over lunch' },
      },
    ]);
  });

  it('is deleted by a manager with a reason; a technician reads who can', async () => {
    serverOf(repairOf('read'));
    const first = draw(<Repair />);
    fireEvent.click(await press('More for this repair'));
    expect(await screen.findByText(/Repairs are deleted by a manager/)).toBeTruthy();
    first.unmount();

    emptyDevice();
    const server = serverOf(repairOf('read'), 'manager');
    const by = { id: 'p1', name: 'Petra Aldwin' };
    server.answers['POST /api/repairs/r1/delete'] = () => {
      const deleted = { at: '2026-06-09T10:00:00.000Z', by, reason: 'Twice' };
      const answer = () => Response.json(repairOf('read', { state: 'deleted', rev: 5, deleted }));
      server.answers['GET /api/repairs/r1'] = answer;
      return answer();
    };
    draw(<Repair />);
    fireEvent.click(await press('More for this repair'));
    fireEvent.click(await press('Delete the repair'));
    fireEvent.change(await screen.findByLabelText('Reason'), { target: { value: 'Twice' } });
    fireEvent.click(await press('Delete the repair'));
    expect(await press('Bring it back')).toBeTruthy();
    expect(server.writes()).toMatchObject([{ path: '/api/repairs/r1/delete', body: { reason: 'Twice' } }]);
  });

  it('that is not there says so and leads to the list', async () => {
    const server = fakeServer('technician');
    server.answers['GET /api/repairs/r1'] = () => problem(404, 'Not here.');
    draw(<Repair />);
    fireEvent.click(await press('All repairs'));
    expect(gone).toHaveBeenCalledWith('/repairs');
  });
});

describe('the module that came out', () => {
  it('is asked for once a spare is in, and is scrapped, set aside, put in stock or back in, with nothing preselected', async () => {
    const server = serverOf(repairOf('prove'));
    server.answers['POST /api/repairs/r1/removed'] = () => Response.json(repairOf('prove', { rev: 5 }));
    draw(<Repair />);
    expect(await screen.findByText('Module 17: nobody has recorded what became of it.')).toBeTruthy();
    fireEvent.click(screen.getByRole('button', { name: 'Record what became of module 17' }));
    const fates = within(await screen.findByRole('radiogroup', { name: 'What became of it' })).getAllByRole('radio');
    expect(fates).toHaveLength(4);
    expect(fates.map((one) => one.getAttribute('aria-checked'))).toEqual(['false', 'false', 'false', 'false']);
    fireEvent.click(fates[1]!);
    fireEvent.click(await press('Record it'));
    await waitFor(() =>
      expect(server.writes()).toMatchObject([
        { path: '/api/repairs/r1/removed', body: { modulePosition: '17', fate: 'quarantine', note: null } },
      ]),
    );
  });

  it('is not asked for before the fit, nor once it is recorded', async () => {
    const removed = [{ id: 'x1', modulePosition: '17', fate: 'scrap' as const, note: null }].map((one) => ({
      ...one,
      at: '2026-06-09T10:00:00.000Z',
      by: { id: 'p2', name: 'Ines Marlow' },
    }));
    serverOf(repairOf('prove', { removed }));
    draw(<Repair />);
    expect(await screen.findByText('Module 17: scrapped')).toBeTruthy();
    expect(screen.queryByText(/nobody has recorded/)).toBeNull();
    expect(unrecorded(repairOf('fit'))).toBeNull();
  });
});

describe('a repair that is over', () => {
  it.each([
    ['handed-over', 'Put it into the archive', 'archive', { archived: true }],
    ['archived', 'Take it out of the archive', 'archive', { archived: false }],
    ['deleted', 'Bring it back', 'restore', {}],
  ] as const)('is %s, and a manager may: %s', async (over, title, to, body) => {
    const server = serverOf(repairOf(null, { state: over, step: null }), 'manager');
    server.answers[`POST /api/repairs/r1/${to}`] = () => Response.json(repairOf(null, { rev: 9 }));
    draw(<Repair />);
    fireEvent.click(await press(title));
    await waitFor(() => expect(server.writes()).toMatchObject([{ path: `/api/repairs/r1/${to}`, body }]));
  });

  it('is not brought back by a technician, who reads who can', async () => {
    serverOf(repairOf(null, { state: 'deleted', step: null }));
    draw(<Repair />);
    expect(await screen.findByText(/^Deleted repairs are brought back by a manager/)).toBeTruthy();
  });
});

describe('the next thing to do', () => {
  const path = (repair: RepairPageDto, mayDecide = false) => {
    const next = nextOfRepair(repair, mayDecide);
    return next.kind === 'go' ? next.path : next.kind;
  };
  it.each([
    ['read', '/repairs/r1/reading'],
    ['second-source', '/repairs/r1/second-source'],
    ['target', '/repairs/r1/target'],
    ['spare', '/repairs/r1/spares'],
    ['charge', '/repairs/r1/spares'],
    ['prove', '/repairs/r1/reading'],
    [null, 'hand-over'],
  ] as const)('at the step %s is %s', (step, to) => expect(path(repairOf(step))).toBe(to));

  it('with a spare and a target is a plan with both, the repair’s number and the module filled in', () => {
    const target = { volts: 3.968, toleranceMillivolts: 5 } as RepairPageDto['target'];
    const spare = { id: 's1', label: 'S-0417', shelfPlace: 'D3' };
    expect(path(repairOf('charge', { spare, target }))).toBe(
      '/plan?spare=s1&target=3.968&tolerance=5&repair=R-2418&position=17',
    );
  });

  it('with a spare within the tolerance is to fit it without a charge, or to read it once more where that is old', () => {
    const target = { volts: 3.968, toleranceMillivolts: 5 } as RepairPageDto['target'];
    const spare = { id: 's1', label: 'S-0417', shelfPlace: 'D3' };
    const asItIs = { readAt: '2026-06-09T09:00:00.000Z', old: false };
    expect(path(repairOf('charge', { spare, target, asItIs }))).toBe('fit');
    expect(path(repairOf('charge', { spare, target, asItIs: { ...asItIs, old: true } }))).toBe('/spares/s1/reading');
  });

  it('of an open charge is that charge’s own', () => {
    const charge = card('R-2418', 'queued', null, { id: 'c9' });
    expect(path(repairOf('charge', { charge }))).toBe('/charges/c9/checks');
    expect(path(repairOf('charge', { charge: { ...charge, stage: 'resting' } }))).toBe('/charges/c9');
  });

  it('of two sources that disagree is to decide, for those who may', () => {
    const repair = repairOf('second-source', { block: disagree });
    expect(nextOfRepair(repair, true).title).toBe('Decide which module it is');
    expect(nextOfRepair(repair, false).title).toBe('Look at the two sources');
  });
});
