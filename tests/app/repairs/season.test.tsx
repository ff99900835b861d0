import { fireEvent, screen } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { RepairSeasonDto } from '@/shared/contract/repair-season';
import { SeasonPart } from '@/shared/screens/repair/season-part';
import { draw, emptyDevice, press, problem } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';

beforeEach(() => emptyDevice());
afterEach(() => vi.unstubAllGlobals());

const path = '/api/repairs/r1/season';
/** Two days: 30 h unread and unplanned, 3 h on the charger, the rest fitted and balanced. */
const season: RepairSeasonDto = {
  ...{ repairId: 'r1', number: 'R-2418', over: true, usedS: 3600, lostS: 7200 },
  ...{ from: '2026-06-07T08:00:00.000Z', to: '2026-06-09T08:00:00.000Z' },
  stretches: [
    { part: 'unread', from: '2026-06-07T08:00:00.000Z', to: '2026-06-08T14:00:00.000Z', chargeId: null },
    { part: 'charging', from: '2026-06-08T14:00:00.000Z', to: '2026-06-08T17:00:00.000Z', chargeId: 'c1' },
    { part: 'balancing', from: '2026-06-08T17:00:00.000Z', to: '2026-06-09T08:00:00.000Z', chargeId: null },
  ],
  totals: [
    { part: 'unread', seconds: 108_000, openSeconds: 50_400 },
    { part: 'charging', seconds: 10_800, openSeconds: 10_800 },
    { part: 'balancing', seconds: 54_000, openSeconds: 3_600 },
  ],
};

describe('where the time of a repair went', () => {
  it('is asked for only when somebody wants to see it, and then names the three longest parts and the lost hours', async () => {
    const server = fakeServer('technician');
    server.answers[`GET ${path}`] = () => Response.json(season);
    draw(<SeasonPart repairId="r1" />);
    const show = await press('Show the whole repair');
    expect(server.sent.filter(({ path: asked }) => asked === path)).toEqual([]);
    fireEvent.click(show);
    expect(
      await screen.findByText(
        /^Most of the working hours: Not read yet 14\sh\s00, Charging 3\sh\s00, After the fit 1\sh\s00\.$/,
      ),
    ).toBeTruthy();
    expect(screen.getByText(/in working hours: 1\sh\s00 used, 2\sh\s00 lost\.$/)).toBeTruthy();
    fireEvent.click(await press('From booking to hand-over, as a table'));
    const rows = screen.getAllByRole('row').map((row) => row.textContent?.replace(/\s/g, ' '));
    expect(rows.slice(1)).toEqual([
      'Not read yetabout 1½ days14 h 00',
      'Charging3 h 003 h 00',
      'After the fit15 h 001 h 00',
    ]);
  });

  it('says why it could not be read', async () => {
    const server = fakeServer('technician');
    server.answers[`GET ${path}`] = () => problem(404, 'This repair is not here.');
    draw(<SeasonPart repairId="r1" />);
    fireEvent.click(await press('Show the whole repair'));
    expect(await screen.findByText('The time of the repair could not be read.')).toBeTruthy();
  });
});
