import { fireEvent, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import PackType from '@/app/(workshop)/workshop/pack-types/[id]';
import type { Role } from '@/shared/contract/roles';
import { draw, emptyDevice, input, press } from '../charges/bench-of';
import { fakeServer } from './server';

const state = vi.hoisted(() => ({ id: 'new', back: vi.fn() }));
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: state.id }),
  useRouter: () => ({ push: state.back, replace: state.back, back: state.back, canGoBack: () => true }),
}));

beforeEach(() => {
  emptyDevice();
  state.back.mockClear();
});
afterEach(() => vi.unstubAllGlobals());

const pack = {
  moduleTypeId: null,
  groupCount: 6,
  groupsPerModule: 2,
  positionOfGroup: ['3 left', '3 left', '1', '1', '2', '2'],
  bleedAmps: 0.15,
  aimMillivolts: 12,
  moduleTypeName: null,
  moduleCount: 3,
};
const saved = { id: 'k1', name: 'Van pack', note: null, pack, rev: 7 };
function open(role: Role, id: string) {
  state.id = id;
  const server = fakeServer(role);
  server.answers['GET /api/pack-types'] = () => Response.json([saved]);
  server.answers['GET /api/module-types'] = () => Response.json([]);
  draw(<PackType />);
  return server;
}
const type = async (label: RegExp, text: string) => fireEvent.change(await input(label), { target: { value: text } });

describe('a pack type', () => {
  it('is refused while its map names 5 positions for 6 groups, and goes out whole with the sixth', async () => {
    const server = open('manager', 'new');
    server.answers['POST /api/pack-types'] = () => Response.json(saved, { status: 201 });
    await type(/^Name/, 'Van pack');
    await type(/^Groups(?! per)/, '6');
    await type(/^Groups per module/, '2');
    await type(/^Module of each group/, '3 left, 3 left, 1, 1, 2');
    expect(screen.getByText('5 of 6 groups have a position.')).toBeTruthy();
    fireEvent.click(await press('Save the pack type'));
    expect(await screen.findByText(/6 groups need 6 positions; 5 were typed/)).toBeTruthy();
    expect(server.writes()).toEqual([]);
    await type(/^Module of each group/, '3 left, 3 left, 1, 1, 2, 2');
    await type(/^Bleed current/, '0,12');
    await type(/^Usually arrives at/, '3,71 V');
    fireEvent.click(await press('Save the pack type'));
    await waitFor(() => expect(state.back).toHaveBeenCalled());
    expect(server.writes()).toMatchObject([
      {
        path: '/api/pack-types',
        body: {
          name: 'Van pack',
          usualArrivalVolts: 3.71,
          pack: { groupCount: 6, positionOfGroup: pack.positionOfGroup, bleedAmps: 0.12, aimMillivolts: 10 },
        },
      },
    ]);
  });

  it('is changed at the revision it was read at', async () => {
    const server = open('manager', 'k1');
    server.answers['PATCH /api/pack-types/k1'] = () => Response.json({ ...saved, rev: 8 });
    await type(/^Name/, 'Van pack 6');
    fireEvent.click(await press('Save the pack type'));
    await waitFor(() => expect(server.writes()).toHaveLength(1));
    expect(server.writes()).toMatchObject([
      { rev: '"7"', body: { name: 'Van pack 6', pack: { positionOfGroup: pack.positionOfGroup } } },
    ]);
  });

  it('can be read by a technician, who has nothing to save with', async () => {
    open('technician', 'k1');
    expect(await screen.findByText('Van pack', { selector: 'h1' })).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Save the pack type' })).toBeNull();
  });
});
