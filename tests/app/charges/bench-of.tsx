import { render, screen } from '@testing-library/react';
import type { ReactElement } from 'react';
import { ClientProvider } from '@/shared/client/client-provider';
import { queryClient } from '@/shared/client/query-client';
import { rememberSignedIn } from '@/shared/client/session-state';
import { waitingQueue } from '@/shared/client/waiting/waiting';
import type { ChargeDto } from '@/shared/contract/charge';
import { FormatsProvider } from '@/shared/ui/format/formats';
import { ToastProvider } from '@/shared/ui/primitives/toast';
import { zone } from '../../shared/ui/charge/charges';
import { fakeServer } from '../workshop/server';

export { problem } from '../workshop/server';

export const meters = [
  { id: 'm1', name: 'Hand meter 1', offsetMillivolts: 0, checkedAt: null, rev: 1 },
  { id: 'm2', name: 'Hand meter 2', offsetMillivolts: 2, checkedAt: null, rev: 1 },
];
const type = { id: 't1', name: '3-series 78 Ah', chemistry: 'nmc', groupsInSeries: 3, maxChargeCelsius: 45 };
const spare = { id: 's1', label: 'S-0398', usedCapacityAh: 70 };

/** Forgets everything kept from the test before. */
export function emptyDevice(): void {
  queryClient.clear();
  localStorage.clear();
  sessionStorage.clear();
  rememberSignedIn('p1');
  void waitingQueue.belongTo('p1');
}

/** The API as a technician meets it with this charge on the bench; 404 as an answer takes it away. */
export function serverWith(charge: ChargeDto) {
  const server = fakeServer('technician');
  const state = { charge };
  Object.assign(server.answers, {
    'GET /api/charges/c1': () => Response.json(state.charge),
    'GET /api/module-types/t1': () => Response.json(type),
    'GET /api/module-types': () => Response.json([type]),
    'GET /api/spares/s1': () => Response.json(spare),
    'GET /api/meters': () => Response.json(meters),
    'GET /api/workshop': () => Response.json({ id: 'w1', lagLimitMillivolts: 20 }),
    'GET /api/board': () => Response.json({ rev: 1, at: charge.createdAt, charges: [], channels: [] }),
    'GET /api/alerts': () => Response.json([]),
    'POST /api/plans': () => Response.json({ plan: { options: [], refusals: [] } }),
  });
  return {
    ...server,
    /** What the next read of the charge gives. */
    becomes: (next: ChargeDto) => (state.charge = next),
  };
}

/** Draws a screen in the zone of the drawings. */
export const draw = (ui: ReactElement) =>
  render(
    <ClientProvider>
      <FormatsProvider languageTag="en-GB" zone={zone}>
        <ToastProvider>{ui}</ToastProvider>
      </FormatsProvider>
    </ClientProvider>,
  );

export const input = (label: string | RegExp) => screen.findByLabelText<HTMLInputElement>(label);
export const press = (name: string | RegExp) => screen.findByRole('button', { name });

/** The sentence that says why a button cannot be pressed. */
export function reasonOf(button: HTMLElement): string | null {
  const id = button.getAttribute('aria-describedby');
  return id ? (document.getElementById(id)?.textContent ?? null) : null;
}
