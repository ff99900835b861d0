import { fireEvent, render, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import EditSpare from '@/app/(workshop)/spares/[id]/edit';
import { ClientProvider } from '@/shared/client/client-provider';
import { queryClient } from '@/shared/client/query-client';
import { rememberSignedIn } from '@/shared/client/session-state';
import { fakeServer, problem } from '../workshop/server';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 's1' }),
}));

const spare = {
  id: 's1',
  label: 'S-0422',
  moduleTypeId: 't1',
  shelfPlace: 'D3',
  capacityAh: 59.2,
  healthPercent: null,
  capacitySource: 'measured',
  condition: 'sound',
  note: null,
  typeName: '2-series 66 Ah',
  rev: 3,
};
const type = { id: 't1', name: '2-series 66 Ah', ratedAh: 66, groupsInSeries: 2 };

beforeEach(() => {
  queryClient.clear();
  localStorage.clear();
  sessionStorage.clear();
  rememberSignedIn('p1');
});
afterEach(() => vi.unstubAllGlobals());

it('tells at a 412 what stands there now, keeps what was typed, and sends it over the present state on the next press', async () => {
  const server = fakeServer('technician');
  server.answers['GET /api/spares/s1'] = () => Response.json(spare);
  server.answers['GET /api/module-types'] = () => Response.json([type]);
  const present = { ...spare, shelfPlace: 'H7', rev: 4 };
  server.answers['PATCH /api/spares/s1'] = () => problem(412, 'Somebody was faster.', { code: 'stale', present });
  render(<EditSpare />, { wrapper: ClientProvider });
  const note = await screen.findByLabelText<HTMLInputElement>('Note');
  fireEvent.change(note, { target: { value: 'scratched' } });
  fireEvent.click(screen.getByRole('button', { name: 'Keep the changes' }));

  await screen.findByText('Somebody has changed this spare meanwhile.');
  expect(screen.getByText('H7')).toBeTruthy();
  expect(screen.getByLabelText<HTMLInputElement>('Note').value).toBe('scratched');

  server.answers['PATCH /api/spares/s1'] = () => Response.json({ ...present, note: 'scratched', rev: 5 });
  fireEvent.click(screen.getByRole('button', { name: 'Go on with what I typed' }));
  fireEvent.click(screen.getByRole('button', { name: 'Keep the changes' }));
  await waitFor(() => expect(server.writes()).toHaveLength(2));
  expect(server.writes().map(({ rev }) => rev?.replaceAll('"', ''))).toEqual(['3', '4']);
  expect(server.writes()[1]!.body).toMatchObject({ note: 'scratched' });
});
