import { act, fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Repair from '@/app/(workshop)/repairs/[id]/index';
import type { PhotoDto } from '@/shared/contract/photo';
import type { RepairPageDto } from '@/shared/contract/repair';
import { draw, emptyDevice, press } from '../charges/bench-of';
import { fakeServer, problem } from '../workshop/server';
import { repairOf } from './repair-of';

const { picked, sendForm } = vi.hoisted(() => ({ picked: vi.fn(), sendForm: vi.fn() }));
vi.mock('@/shared/ui/repair/pick-photo', () => ({ canPickPhoto: true, pickPhoto: picked }));
vi.mock('@/shared/client/send-form', () => ({
  sendForm: (...sent: unknown[]) => sendForm(...sent) as Promise<Response>,
}));
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'r1' }),
  useRouter: () => ({ push: vi.fn(), replace: vi.fn(), back: vi.fn(), canGoBack: () => false }),
}));

beforeEach(() => {
  emptyDevice();
  picked.mockReset();
  sendForm.mockReset();
});
afterEach(() => vi.unstubAllGlobals());

const photoOf = (more: Partial<PhotoDto> = {}): PhotoDto => ({
  id: 'f1',
  at: '2026-06-08T13:20:00.000Z',
  by: { id: 'p2', name: 'Ines Marlow' },
  width: 1200,
  height: 900,
  caption: null,
  seen: 'none',
  modulePosition: null,
  spare: null,
  rev: 1,
  ...more,
});
function serverOf(present: RepairPageDto) {
  const server = fakeServer('technician');
  server.answers['GET /api/repairs/r1'] = () => Response.json(present);
  return server;
}
const file = (bytes: number) => ({ name: 'a.jpg', bytes, file: new Blob(['x']), mark: `a.jpg.${bytes}.1` });

describe('photos on the page of a repair', () => {
  it('are sent as one form with a key, tell how far they are, and stand in the grid by name', async () => {
    const server = serverOf(repairOf('read'));
    draw(<Repair />);
    expect(await screen.findByText(/No photos yet/)).toBeTruthy();
    let finish: (answer: Response) => void = () => undefined;
    sendForm.mockImplementation(() => new Promise<Response>((resolve) => (finish = resolve)));
    picked.mockResolvedValue(file(2 * 1024 * 1024));
    fireEvent.click(await press('Take a photo'));
    await waitFor(() => expect(sendForm).toHaveBeenCalled());
    expect(picked).toHaveBeenCalledWith('camera');
    const [path, init, onSent] = sendForm.mock.calls[0] as [string, RequestInit, (share: number) => void];
    expect(path).toBe('/api/repairs/r1/photos');
    expect([...(init.body as FormData).keys()]).toEqual(['photo']);
    expect(new Headers(init.headers).get('idempotency-key')).toMatch(/^[0-9a-f]{32}$/);
    expect(new Headers(init.headers).get('content-type')).toBeNull();
    act(() => onSent(0.5));
    expect(screen.getByText('Sending the photo, 1.0 of 2.0 MB')).toBeTruthy();
    const added = repairOf('read', { rev: 9, photos: [photoOf()] });
    server.answers['GET /api/repairs/r1'] = () => Response.json(added);
    finish(Response.json(added, { status: 201 }));
    expect(await screen.findByRole('button', { name: /^Photo of the pack, Ines, / })).toBeTruthy();
    expect(screen.queryByText(/Sending the photo, /)).toBeNull();
  });

  it('that are empty or over 16 MB are not sent at all; what the server refuses says what to change', async () => {
    serverOf(repairOf('read'));
    draw(<Repair />);
    picked
      .mockResolvedValueOnce(file(0))
      .mockResolvedValueOnce(file(20 * 1024 * 1024))
      .mockResolvedValue(file(900));
    fireEvent.click(await press('Choose a photo'));
    expect(await screen.findByText('This file is empty. Take the photo again.')).toBeTruthy();
    fireEvent.click(await press('Choose a photo'));
    expect(await screen.findByText(/20\.0 MB, and 16\.0 MB is the most/)).toBeTruthy();
    expect(sendForm).not.toHaveBeenCalled();
    const says = 'This is no photo. Choose a JPEG, PNG or WebP picture.';
    sendForm.mockResolvedValue(problem(415, says, { fields: { photo: says } }));
    fireEvent.click(await press('Choose a photo'));
    expect(await screen.findByText(says)).toBeTruthy();
  });

  it('open in full with words for who cannot see them, and take what is seen on a module', async () => {
    const server = serverOf(repairOf('spare', { photos: [photoOf({ rev: 4 })] }));
    const noted = repairOf('spare', {
      rev: 9,
      photos: [photoOf({ rev: 5, seen: 'leak', modulePosition: '18' })],
      conditions: [
        {
          ...{ modulePosition: '18', condition: 'leaking', photoId: 'f1', fate: null },
          ...{ at: '2026-06-08T13:20:00.000Z', by: { id: 'p2', name: 'Ines Marlow' } },
        },
      ],
      block: { code: 'module-condition', text: 'Module 18 is leaking on a photo.', role: null },
    });
    server.answers['PATCH /api/photos/f1'] = () => {
      server.answers['GET /api/repairs/r1'] = () => Response.json(noted);
      return Response.json(noted);
    };
    draw(<Repair />);
    fireEvent.click(await screen.findByRole('button', { name: /^Photo of the pack/ }));
    const sheet = within(await screen.findByRole('dialog'));
    expect(sheet.getByRole('img', { name: /^Photo of the pack, Ines/ }).getAttribute('src')).toBe('/api/photos/f1');
    fireEvent.click(sheet.getByRole('radio', { name: /^Leak/ }));
    expect(sheet.getByText('Say on which module it was seen.')).toBeTruthy();
    fireEvent.change(sheet.getByLabelText('It shows'), { target: { value: 'module.18' } });
    fireEvent.click(sheet.getByRole('button', { name: 'Save what is seen' }));
    expect(await screen.findByText('Module 18 is leaking.')).toBeTruthy();
    expect(server.writes()).toEqual([
      {
        method: 'PATCH',
        path: '/api/photos/f1',
        rev: '"4"',
        body: { seen: 'leak', modulePosition: '18', spareId: null, caption: null, charge: null },
      },
    ]);
    expect(await press('Record what became of the module')).toBeTruthy();
  });
});
