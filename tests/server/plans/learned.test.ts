import { afterEach, beforeEach, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import type { PlanDto, PlanOption } from '@/shared/contract/plan';
import { act, at, did, hour, kept, makeBench, planned, running, seen, wishOf, type Bench } from '../charges/bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const currentS = (option: PlanOption): number =>
  option.segments.filter(({ kind }) => kind === 'cc' || kind === 'taper').reduce((sum, s) => sum + s.toS - s.fromS, 0);

/** A charge that is switched off after `ratio` times the current reckoned without anything learned, judged in tolerance and fitted. */
async function closed(label: string, ratio: number, held = false): Promise<ChargeDto> {
  const charge = await running(bench, { spareId: await bench.spare(label) });
  const end = at(charge.startedAt) + (ratio * currentS(charge.option) * 1000) / (charge.option.timeFactor?.mean ?? 1);
  if (held) {
    bench.server.clock.advance(hour);
    const stopped = await did(bench, await seen(bench, charge.id), 'hold', { reason: 'Fan off.' });
    bench.server.clock.advance(hour);
    await did(bench, stopped, 'resume');
  }
  bench.server.clock.advance(end - bench.server.clock.now());
  await bench.sleeper.runDue();
  const off = await did(bench, await seen(bench, charge.id), 'current-off', { at: new Date(end).toISOString() });
  bench.server.clock.advance(at(off.checkDueAt) - bench.server.clock.now() + 1000);
  await bench.sleeper.runDue();
  const judged = await did(bench, await seen(bench, charge.id), 'rest-check', {
    groupVolts: [3.949, 3.949],
    celsius: 21,
    meterId: bench.meterId,
  });
  return did(bench, judged, 'fit');
}

// By hand: the prior of the logarithm is 0 ± 0.06; single charges scatter by 0.06, worth four charges, which three equal ones
// bring down to a variance of 4 · 0.06² / 6. Three charges then weigh 4.5 against the prior's 1: ln 1.2 · 4.5 / 5.5 is ln 1.161.
test('three charges that took 1.2 times as long make the next plan on that charger 1.161 times as long, and it is frozen', async () => {
  const spareId = await bench.spare('S-0001');
  const before = await planned(bench, { spareId });
  expect(before.timeFactor).toBeUndefined();
  for (const label of ['S-0002', 'S-0003', 'S-0004']) await closed(label, 1.2);
  const after = await planned(bench, { spareId: await bench.spare('S-0005') });
  expect(after.timeFactor!.charges).toBe(3);
  expect(after.timeFactor!.mean).toBeCloseTo(1.161, 3);
  expect(after.timeFactorText).toBe('Learned from 3 charges: 16\u00a0% longer than reckoned.');
  expect(currentS(after) / currentS(before)).toBeCloseTo(after.timeFactor!.mean, 1);
  const charge = await kept(bench, { spareId: await bench.spare('S-0006') });
  expect(charge.option.timeFactor).toEqual(after.timeFactor);
  const [row] = (await bench.server.deps.dataSource.query(
    `SELECT json_extract(frozen, '$.channels[0].timeFactor.charges') AS charges FROM charge WHERE id = '${charge.id}'`,
  )) as { charges: number }[];
  expect(row!.charges).toBe(3);
});

test('a plan without what was learned is the plan of before, to the last digit', async () => {
  const spareId = await bench.spare('S-0001');
  const before = await planned(bench, { spareId });
  await closed('S-0002', 1.3);
  const wish = { ...wishOf(bench, { spareId: await bench.spare('S-0003') }), withoutLearned: true };
  const answer = await bench.as('technician').post('/api/plans', wish);
  const [option] = (answer.body as PlanDto).plan.options.filter(({ id }) => id === before.id);
  expect(option!.timeFactor).toBeUndefined();
  expect(option!.totalS).toEqual(before.totalS);
});

test('the second charge is not taught what the first has taught already: equal charges keep the factor under their own', async () => {
  await closed('S-0001', 1.2);
  const first = (await planned(bench, { spareId: await bench.spare('S-0002') })).timeFactor!.mean;
  // Planned with the factor of the first: as long as that says is what this one takes.
  await closed('S-0003', first);
  const second = (await planned(bench, { spareId: await bench.spare('S-0004') })).timeFactor!.mean;
  expect(first).toBeGreaterThan(1.05);
  // It took `first` times what was reckoned; were the plan's own factor not taken out, this would count as 1.
  expect(second).toBeGreaterThan(1.08);
});

test('a held charge and one whose end nobody has said teach nothing', async () => {
  await closed('S-0001', 1.2, true);
  const unsaid = await running(bench, { spareId: await bench.spare('S-0002') }, { channel: 'B1' });
  await bench.live(at(unsaid.checkDueAt) - bench.server.clock.now() + 60_000, hour);
  const judged = await did(bench, await seen(bench, unsaid.id), 'rest-check', {
    groupVolts: [3.949, 3.949],
    celsius: 21,
    meterId: bench.meterId,
  });
  expect((await act(bench, judged, 'fit')).status).toBe(200);
  for (const channel of ['A1', 'B1'])
    expect((await planned(bench, { spareId: await bench.spare(`S-1${channel}`) }, { channel })).timeFactor).toBe(
      undefined,
    );
});
