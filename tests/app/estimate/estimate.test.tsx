import { fireEvent, render, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Estimate from '@/app/estimate';
import { ClientProvider } from '@/shared/client/client-provider';
import { queryClient } from '@/shared/client/query-client';

beforeEach(() => {
  queryClient.clear();
  localStorage.clear();
  sessionStorage.clear();
  vi.stubGlobal('fetch', async () => Response.json({ title: 'No.', status: 401, detail: 'No.' }, { status: 401 }));
});
afterEach(() => vi.unstubAllGlobals());

const type = (label: string, text: string) => {
  fireEvent.change(screen.getByLabelText(label), { target: { value: text } });
  fireEvent.blur(screen.getByLabelText(label));
};
const typeAll = () => {
  type('Spare rests at', '3.620');
  type('Pack rests at', '3,925');
  type('Capacity', '66');
  type('Groups in series', '2');
  type('Charger gives', '20');
};

describe('the quick estimate', () => {
  it('gives a time with its band for six numbers, without asking the server', async () => {
    render(<Estimate />, { wrapper: ClientProvider });
    typeAll();
    await screen.findByText('Ready after', {}, { timeout: 15_000 });
    expect(screen.getByText(/^\(\d:\d\d–\d:\d\d\)$/)).toBeTruthy();
  });

  it('keeps 39.68 V as typed, says what to change, and shows no time', async () => {
    render(<Estimate />, { wrapper: ClientProvider });
    typeAll();
    await screen.findByText('Ready after', {}, { timeout: 15_000 });
    type('Pack rests at', '39.68 V');
    await screen.findByText(/A point in the wrong place\?/);
    expect(screen.getByLabelText<HTMLInputElement>('Pack rests at').value).toBe('39.68 V');
    await waitFor(() => expect(screen.queryByText('Ready after')).toBeNull());
  });

  it('refuses a spare at 2.41 V and offers no time', async () => {
    render(<Estimate />, { wrapper: ClientProvider });
    typeAll();
    type('Spare rests at', '2.41');
    await screen.findByText('Not to be charged', {}, { timeout: 15_000 });
    expect(screen.queryByText('Ready after')).toBeNull();
  });
});
