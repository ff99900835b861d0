import { afterEach, beforeEach, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import { alertsOf, key, makeBench, minute, running, seen, type Bench } from './bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

async function logged(charge: Pick<ChargeDto, 'id'>, reading: object): Promise<ChargeDto> {
  const answer = await bench
    .as('technician')
    .post(`/api/charges/${charge.id}/readings`, reading)
    .set('Idempotency-Key', key());
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  return answer.body as ChargeDto;
}
const oddAlerts = async () => (await alertsOf(bench)).filter(({ kind }) => kind === 'no-current');

test('a current of 0 A where 10 A are set is odd at once, is told once, and is settled by the next reading that fits', async () => {
  const charge = await running(bench, { spareId: await bench.spare('S-0402') });
  await bench.live(20 * minute, 5 * minute);
  const good = await logged(charge, { amps: '10' });
  expect(good.odd).toBeNull();
  expect(await oddAlerts()).toEqual([]);
  await bench.live(15 * minute, 5 * minute);
  const odd = await logged(charge, { amps: '0' });
  expect(odd.odd).toMatchObject({ kind: 'no-current', quantity: 'amps', seen: 0 });
  // To the millisecond: the screen marks the readings from this instant on.
  expect(odd.odd!.since).toBe(odd.readings.at(-1)!.at);
  const [alert] = await oddAlerts();
  expect(alert).toMatchObject({ level: 'alarm', clearedAt: null, chargeId: charge.id });
  expect(alert!.seen).toMatch(/^No current flows\. .*A was expected\.$/);
  expect(alert!.checkFirst).toMatch(/^Whether A1 is on, then the clips/);
  await bench.live(2 * minute, minute);
  await logged(charge, { amps: '0' });
  expect(await oddAlerts()).toHaveLength(1);
  await bench.live(2 * minute, minute);
  const fits = await logged(charge, { amps: '10' });
  expect(fits.odd).toBeNull();
  expect((await oddAlerts())[0]!.clearedAt).not.toBeNull();
  // The same kind again in the same charge is shown, and rings no second time.
  await bench.live(5 * minute, minute);
  expect((await logged(charge, { amps: '0' })).odd).not.toBeNull();
  expect(await oddAlerts()).toHaveLength(1);
});

test('what the readings of a charge have taught stands with what was thought before', async () => {
  const charge = await running(bench, { spareId: await bench.spare('S-0402') });
  expect(charge.learned).toEqual({ capacityAh: null, longOhm: null, leadOhm: null });
  for (let n = 0; n < 3; n += 1) {
    await bench.live(20 * minute, 5 * minute);
    const { expected } = await logged(charge, { amps: '10', celsius: '21' });
    await logged(charge, { terminalVolts: String(Math.round(expected!.terminalVolts * 1000) / 1000), amps: '10' });
  }
  const { learned } = await seen(bench, charge.id);
  const told = Object.values(learned).filter((one) => one !== null);
  expect(told.length).toBeGreaterThan(0);
  for (const { mean, sd, priorSd } of told) {
    expect(mean).toBeGreaterThan(0);
    expect(sd).toBeLessThan(priorSd);
  }
});

test('every reading says where it was taken: as said, else what the charger senses; of a hand meter it must be said', async () => {
  const charge = await running(bench, { spareId: await bench.spare('S-0402') });
  bench.server.clock.advance(10 * minute);
  await logged(charge, { terminalVolts: '7.7', amps: '10' });
  bench.server.clock.advance(minute);
  await logged(charge, { terminalVolts: '7.71', meterId: bench.meterId, takenAt: 'module' });
  bench.server.clock.advance(minute);
  await logged(charge, { terminalVolts: '7.72', takenAt: 'supply' });
  bench.server.clock.advance(minute);
  const last = await logged(charge, { amps: '10' });
  expect(last.readings.map(({ takenAt, meterId }) => [takenAt, meterId])).toEqual([
    ['module', null],
    ['module', bench.meterId],
    ['supply', null],
    [null, null],
  ]);
});
