import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { alertsOf, did, hour, makeBench, minute, running, seen, type Bench } from '../charges/bench';
import { clock, hoursOf, onlyTwoWork } from './day';

describe('a look-in that nobody came for', () => {
  let bench: Bench;
  afterEach(() => bench.server.close());
  const begin = async (now: string, settings: object = {}) => {
    bench = await makeBench({ now: Date.parse(now) });
    await onlyTwoWork(bench);
    if (Object.keys(settings).length === 0) return;
    const { rev } = (await bench.as('manager').get('/api/workshop')).body as { rev: number };
    const change = bench.as('manager').patch('/api/workshop', settings);
    await change.set('If-Match', `"${rev}"`).expect(200);
  };
  const open = async (kind: string) =>
    (await alertsOf(bench)).filter((alert) => alert.kind === kind && alert.clearedAt === null);

  describe('by day', () => {
    beforeEach(() => begin(clock('10:00')));

    it('takes the place of the one that was due, and stands alone while further ones pass', async () => {
      const charge = await running(bench, { spareId: await bench.spare('S-1') });
      await bench.live(hour + 5 * minute);
      expect(await open('look-in-due')).toHaveLength(1);
      await bench.live(11 * minute);
      expect(await open('look-in-due')).toHaveLength(0);
      const [missed] = await open('look-in-missed');
      expect(missed).toMatchObject({ level: 'amber', title: `Look-in at ${charge.title}` });
      expect(missed!.seen).toBe('Nobody has looked in since 10:00.');
      await bench.live(65 * minute, 5 * minute);
      expect((await open('look-in-missed')).map(({ id }) => id)).toEqual([missed!.id]);
    });

    it('is none where a reading was logged', async () => {
      const charge = await running(bench, { spareId: await bench.spare('S-1') });
      await bench.live(hour + 5 * minute);
      await did(bench, await seen(bench, charge.id), 'readings', { terminalVolts: '7.80', amps: '10' });
      await bench.live(30 * minute);
      expect(await open('look-in-missed')).toEqual([]);
    });

    it('is missed after one interval where that is less than 15 min', async () => {
      await bench.server.close();
      await begin(clock('10:00'), { lookInMinutes: 10 });
      await running(bench, { spareId: await bench.spare('S-1') });
      await bench.live(19 * minute);
      expect(await open('look-in-missed')).toEqual([]);
      await bench.live(2 * minute);
      expect(await open('look-in-missed')).toHaveLength(1);
    });

    it('goes to who is there in place of a person who is away', async () => {
      const charge = await running(bench, { spareId: await bench.spare('S-1') });
      const { technician, foreman } = bench.server.own.people;
      expect(charge.person!.id).toBe(technician.id);
      await hoursOf(bench, technician.id, { daysOff: [{ from: '2026-06-09', to: '2026-06-09', note: null }] });
      await bench.live(hour + minute);
      expect((await open('look-in-due'))[0]!.for!.id).toBe(foreman.id);
      await bench.live(15 * minute);
      expect((await open('look-in-missed'))[0]!.for!.id).toBe(foreman.id);
    });
  });

  it('at night rings nobody where charges may run unattended, and is told when somebody comes', async () => {
    await begin(clock('16:30'), { unattendedCharges: true, minRestMinutes: 1200 });
    await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(15 * hour, 5 * minute);
    // It is 07:30, and the first comes at 08:00.
    expect(await open('look-in-missed')).toEqual([]);
    await bench.live(40 * minute, 5 * minute);
    expect(await open('look-in-missed')).toHaveLength(1);
  });

  it('at night is told where they may not', async () => {
    await begin(clock('16:30'));
    await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(80 * minute, 5 * minute);
    expect(await open('look-in-missed')).toHaveLength(1);
  });
});
