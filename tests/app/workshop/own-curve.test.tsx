import { fireEvent, render, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import ModuleType from '@/app/(workshop)/workshop/module-types/[id]';
import { NMC_MOHTAT_2020 } from '@/calc/parameters/nmc-mohtat-2020';
import { ClientProvider } from '@/shared/client/client-provider';
import { queryClient } from '@/shared/client/query-client';
import { rememberSignedIn } from '@/shared/client/session-state';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import { ToastProvider } from '@/shared/ui/primitives/toast';
import { fakeServer, problem } from './server';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 't1' }),
}));

const type: ModuleTypeDto = {
  id: 't1',
  name: '2-series 66 Ah',
  chemistry: 'nmc',
  groupsInSeries: 2,
  cellsInParallel: 3,
  ratedAh: 66,
  chargeLimitVolts: 4.2,
  dischargeLimitVolts: 3,
  floorVolts: 2.5,
  maxChargeAmps: 66,
  maxDischargeAmps: 66,
  minChargeCelsius: 10,
  maxChargeCelsius: 45,
  resistanceMilliohm: 1.5,
  resistanceKind: 'pulse-10s',
  linkMilliohm: 0.2,
  shelfVolts: null,
  selfDischargePercentPerMonth: null,
  note: null,
  curveId: null,
  pulseShortS: null,
  pulseShortMilliohm: null,
  pulseLongerS: null,
  pulseLongerMilliohm: null,
  coldCurrentPercent: null,
  warmCurrentPercent: null,
  prechargeBelowVolts: null,
  ownCurve: null,
  spareCount: 1,
  chargeCount: 0,
  rev: 4,
};
/** Eleven rows of a published curve, P. Mohtat et al. (2020). */
const points = Array.from({ length: 11 }, (_, at) => {
  const index = Math.round((at / 10) * (NMC_MOHTAT_2020.soc.length - 1));
  return [NMC_MOHTAT_2020.soc[index]!, NMC_MOHTAT_2020.volts[index]!] as const;
});
const csv = points.map(([soc, volts]) => `${soc};${volts}`).join('\n');

let server: ReturnType<typeof fakeServer>;
let present: ModuleTypeDto;
beforeEach(() => {
  queryClient.clear();
  localStorage.clear();
  sessionStorage.clear();
  rememberSignedIn('p1');
  server = fakeServer('manager');
  present = type;
  server.answers['GET /api/module-types/t1'] = () => Response.json(present);
  server.answers['GET /api/module-types'] = () => Response.json([present]);
  render(
    <ClientProvider>
      <ToastProvider>
        <ModuleType />
      </ToastProvider>
    </ClientProvider>,
  );
});
afterEach(() => vi.unstubAllGlobals());

const openSheet = async () => {
  fireEvent.click(await screen.findByRole('button', { name: 'Own curve from a CSV' }, { timeout: 25_000 }));
  const sheet = within(await screen.findByRole('dialog', undefined, { timeout: 25_000 }));
  fireEvent.change(await sheet.findByLabelText('Or paste the rows'), { target: { value: csv } });
  return sheet;
};

it('keeps an own curve with one write at the revision that was seen, and the form goes on from the new one', async () => {
  server.answers['PUT /api/module-types/t1/curve'] = () => {
    present = {
      ...type,
      ownCurve: { soc: points.map(([soc]) => soc), volts: points.map(([, volts]) => volts) },
      rev: 5,
    };
    return Response.json(present);
  };
  server.answers['PATCH /api/module-types/t1'] = (body) => Response.json({ ...present, ...(body as object), rev: 6 });
  const sheet = await openSheet();
  fireEvent.click(sheet.getByRole('button', { name: 'Save the curve' }));
  expect(await screen.findByText(/^Own curve, 11 points from/)).toBeTruthy();
  expect(server.writes()).toEqual([{ method: 'PUT', path: '/api/module-types/t1/curve', rev: '"4"', body: { csv } }]);
  fireEvent.click(screen.getByRole('button', { name: 'Save the type' }));
  await waitFor(() => expect(server.writes().at(-1)).toMatchObject({ method: 'PATCH', rev: '"5"' }));
  expect(server.writes().at(-1)!.body).toMatchObject({ curveId: null, coldCurrentPercent: null });
});

it('says the server’s sentences by row and keeps what was pasted', async () => {
  server.answers['PUT /api/module-types/t1/curve'] = () =>
    problem(400, 'The curve cannot be taken.', { fields: { 'csv.4': 'Row 4: 3.2 V does not rise.' } });
  const sheet = await openSheet();
  fireEvent.click(sheet.getByRole('button', { name: 'Save the curve' }));
  expect(await screen.findByText('Row 4: 3.2 V does not rise.')).toBeTruthy();
  expect((sheet.getByLabelText('Or paste the rows') as HTMLTextAreaElement).value).toBe(csv);
});
