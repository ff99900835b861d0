import { cleanup, fireEvent, screen, waitFor, within } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Plan from '@/app/(workshop)/plan';
import { planCharge } from '@/calc';
import type { PlanDto } from '@/shared/contract/plan';
import { channel, planInput } from '../../calc/plan-fixtures';
import { pressFrom } from '../../support/press';
import { draw, emptyDevice, input, meters, press, problem } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';
import { spareOf } from './spare-of';

const address = vi.hoisted(() => ({ params: { spare: 's1' } as Record<string, string> }));
vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => address.params,
}));

const spare = spareOf();

const planned: PlanDto = {
  plan: planCharge(planInput({ channels: [channel('A1')] })),
  plannedAt: new Date().toISOString(),
  clipOnAt: new Date().toISOString(),
  targetVolts: 3.92,
  toleranceMillivolts: 5,
  channels: { 'id-A1': { name: 'A1', chargerName: 'Supply A', freeAt: null } },
};

let server: ReturnType<typeof fakeServer>;
beforeEach(() => {
  emptyDevice();
  vi.mocked(router.replace).mockClear();
  server = fakeServer('technician');
  Object.assign(server.answers, {
    'GET /api/spares': () => Response.json([spare]),
    'GET /api/meters': () => Response.json(meters),
    'GET /api/module-types': () => Response.json([{ id: 't1', chemistry: 'nmc' }]),
    'GET /api/workshop': () => Response.json({ id: 'w1', toleranceMillivolts: 5 }),
    'POST /api/plans': () => Response.json(planned),
  });
  draw(<Plan />);
});
afterEach(() => vi.unstubAllGlobals());

const type = async (label: string, text: string) => fireEvent.change(await input(label), { target: { value: text } });
const checks = () => screen.getByRole('button', { name: 'Checks before clipping on' });
const overLimit = /^39\.68\s?V is over this type.s 4\.20\s?V/;
/** A disabled button stays in the tab order and says so by itself. */
const reckoned = () =>
  waitFor(() => {
    expect(server.writes().some(({ path }) => path === '/api/plans')).toBe(true);
    expect(checks().getAttribute('aria-disabled')).toBeNull();
  });
const kept = () => server.writes().filter(({ path }) => path === '/api/charges');

describe('planning a charge', () => {
  it('pressed straight from a wrong voltage moves nothing before the click, then says what is wrong and how many', async () => {
    await type('Pack rests at', '39.68');
    const { down, click } = await pressFrom(await input('Pack rests at'), checks);
    expect(click).toBe(down);
    expect(await screen.findByText(overLimit)).toBeTruthy();
    expect(screen.getByText('One field needs a change.')).toBeTruthy();
    expect((await input('Pack rests at')).value).toBe('39.68');
    expect(kept()).toEqual([]);
  });

  it('says nothing of a field that is still typed in, and says it once the field is left', async () => {
    await type('Pack rests at', '39.68');
    expect(screen.queryByText(/is over/)).toBeNull();
    fireEvent.blur(await input('Pack rests at'));
    expect(await screen.findByText(overLimit)).toBeTruthy();
  });

  it('reckons what was typed and keeps the soonest way for its checks', async () => {
    server.answers['POST /api/charges'] = () => Response.json({ id: 'c7', number: 'B-0007', rev: 1 });
    await type('Pack rests at', '3,92 V');
    await type('Repair', 'R-2418');
    const soonest = planned.plan.options.find((option) => option.soonest)!;
    await reckoned();
    fireEvent.click(checks());
    await waitFor(() => expect(router.replace).toHaveBeenCalledWith('/charges/c7/checks'));
    expect(kept()[0]!.body).toMatchObject({
      spareId: 's1',
      targetVolts: 3.92,
      repairRef: 'R-2418',
      optionId: soonest.id,
    });
  });

  it('keeps everything typed where the spare was taken meanwhile, and leads to the charge that has it', async () => {
    server.answers['POST /api/charges'] = () =>
      problem(409, 'S-0398 is on a charge already.', { present: { chargeId: 'c3', title: 'R-2411' } });
    await type('Pack rests at', '3.92');
    await reckoned();
    fireEvent.click(checks());
    expect(await screen.findByText(/^S-0398 is on a charge already/)).toBeTruthy();
    fireEvent.click(await screen.findByText('Open the charge R-2411'));
    expect(router.push).toHaveBeenCalledWith('/charges/c3');
    expect((await input('Pack rests at')).value).toBe('3.92');
    expect(await press('Checks before clipping on')).toBeTruthy();
  });

  it('says what 14 closed charges have taught, and reckons and keeps without it where that is taken off', async () => {
    const text = 'Learned from 14 charges: 6 % longer than reckoned.';
    server.answers['POST /api/plans'] = (body) =>
      Response.json(
        (body as { withoutLearned?: boolean }).withoutLearned
          ? planned
          : {
              ...planned,
              plan: {
                ...planned.plan,
                options: planned.plan.options.map((option) => ({
                  ...option,
                  timeFactor: { mean: 1.06, sd: 0.03, charges: 14 },
                  timeFactorText: text,
                })),
              },
            },
      );
    server.answers['POST /api/charges'] = () => Response.json({ id: 'c7', number: 'C-0007', rev: 1 });
    await type('Pack rests at', '3.92');
    expect(await screen.findByText(text)).toBeTruthy();
    fireEvent.click(await press('without what was learned'));
    expect(await press('with what was learned')).toBeTruthy();
    await waitFor(() => expect(screen.queryByText(text)).toBeNull());
    await reckoned();
    fireEvent.click(checks());
    await waitFor(() => expect(kept()).toHaveLength(1));
    expect(kept()[0]!.body).toMatchObject({ withoutLearned: true });
  });

  it('refused on the flat of the curve shows the band it would have, and plans it only once that is taken', async () => {
    const text = 'The curve is flat at 3.300 V: that may be 35 % to 62 % of charge.';
    const plateau = {
      totalS: { p10: 12_600, p50: 18_000, p90: 32_400 },
      soc: { p10: 0.35, p50: 0.48, p90: 0.62 },
    };
    server.answers['POST /api/plans'] = (body) =>
      Response.json(
        (body as { acceptWideBand?: boolean }).acceptWideBand
          ? planned
          : {
              ...planned,
              plan: {
                ...planned.plan,
                options: [],
                refusals: [{ code: 'numbers', group: null, text, plateau }],
              },
            },
      );
    await type('Pack rests at', '3.300');
    const box = within(await screen.findByRole('alert', { name: 'The voltage says too little here' }));
    expect(box.getByText('(3:30–9:00)')).toBeTruthy();
    expect(box.getByText(/^\(35–62\s%\)$/)).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Quarantine' })).toBeNull();
    fireEvent.click(box.getByRole('button', { name: 'Plan it all the same' }));
    await screen.findByText('Ways, soonest first');
    expect(server.writes().at(-1)!.body).toMatchObject({ targetVolts: 3.3, acceptWideBand: true });
    // Another target has another band: what was taken counts for the old one only.
    await type('Pack rests at', '3.310');
    expect(await screen.findByRole('alert', { name: 'The voltage says too little here' })).toBeTruthy();
    expect(server.writes().at(-1)!.body).not.toHaveProperty('acceptWideBand');
  });

  it('made again from a charge keeps the new one in place of it', async () => {
    cleanup();
    address.params = { spare: 's1', insteadOf: 'c1', target: '3.92', tolerance: '5' };
    try {
      server.answers['POST /api/charges'] = () => Response.json({ id: 'c7', number: 'C-0007', rev: 1 });
      draw(<Plan />);
      await reckoned();
      fireEvent.click(checks());
      await waitFor(() => expect(router.replace).toHaveBeenCalledWith('/charges/c7/checks'));
      expect(kept()[0]!.body).toMatchObject({ spareId: 's1', targetVolts: 3.92, insteadOf: 'c1' });
    } finally {
      address.params = { spare: 's1' };
    }
  });
});
