import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { Charger } from '@/server/entities/charger';
import type { RepairPageDto } from '@/shared/contract/repair';
import { packReadingForm, secondSourceForm } from '@/tests/support/repaired';
import { hour, makeBench, minute, type Bench } from '../charges/bench';
import { arrival, levelled, makeShop, strip, stripOf, taken, type Shop } from './shop';

let bench: Bench;
let shop: Shop;
let page: RepairPageDto;
beforeEach(async () => {
  bench = await makeBench();
  shop = makeShop(bench);
  page = await shop.book();
});
afterEach(() => bench.server.close());

const sendReading = (change: object) => shop.send(`repairs/${page.id}/readings`, packReadingForm(change));

describe('a reading of the pack', () => {
  test('with 7 of 8 groups is refused with both numbers, and nothing of it is kept', async () => {
    const answer = await sendReading({ groupVolts: arrival.slice(1) });
    expect([answer.status, answer.body.fields]).toEqual([
      400,
      { groupVolts: 'This pack has 8 groups; 7 voltages were read.' },
    ]);
    expect((await shop.seen(page.id)).readings).toEqual([]);
  });

  test('is checked group by group against the window of the module type', async () => {
    const answer = await sendReading({ groupVolts: arrival.map((volts, group) => (group === 5 ? 4.9 : volts)) });
    expect(answer.status).toBe(400);
    expect(Object.keys(answer.body.fields as object)).toEqual(['groupVolts.5']);
    expect(answer.body.fields['groupVolts.5']).toContain('over this type’s 4.20'.replace('’', "'"));
  });

  test('of another workshop’s meter, or of tomorrow, is refused at its field', async () => {
    const at = new Date(bench.server.clock.now() + 24 * hour).toISOString();
    const answer = await sendReading({ groupVolts: arrival, meterId: 'nobody-has-this', at });
    expect(Object.keys(answer.body.fields as object).sort()).toEqual(['at', 'meterId']);
  });

  test('tells spread, median, odd groups, their module, and ampere-hours against the median', async () => {
    const [reading] = (await shop.read(page.id, arrival)).readings;
    // Sorted: 3.852 3.915 3.948 3.949 3.949 3.949 3.950 3.951: the middle two are 3.949.
    expect(reading).toMatchObject({
      spreadMillivolts: 99,
      medianVolts: 3.949,
      lowestVolts: 3.852,
      highestVolts: 3.951,
      odd: [2, 3],
      oddPositions: ['2'],
      change: null,
      setAside: null,
      by: { name: 'Technician of own' },
    });
    const ampHours = reading!.groupAmpHours!;
    expect(ampHours[0]).toBeCloseTo(0, 9);
    expect(ampHours[2]).toBeLessThan(ampHours[3]!);
    expect(reading!.spreadAmpHours).toBeCloseTo(Math.max(...ampHours) - Math.min(...ampHours), 9);
  });

  test('that was wrong is set aside with the reason; what was built on it falls, and twice is refused', async () => {
    page = await shop.take(await shop.confirm(await shop.read(page.id, arrival)));
    const path = `repairs/${page.id}/readings/${page.readings[0]!.id}/set-aside`;
    page = await taken(shop.send(path, { reason: 'The neighbour’s pack.' }));
    expect(page.readings[0]!.setAside).toMatchObject({
      reason: 'The neighbour’s pack.',
      by: { name: 'Technician of own' },
    });
    expect([page.computed, page.target, page.failing]).toEqual([null, null, null]);
    expect(stripOf(page)).toEqual(strip(0));
    expect([page.waits, page.wait.length]).toEqual([false, 1]);
    expect((await shop.send(path, { reason: 'Again.' })).status).toBe(409);
  });

  test('a second arrival reading keeps what follows where it points to the same module, and begins it anew where not', async () => {
    page = await shop.take(await shop.confirm(await shop.read(page.id, arrival)));
    expect(stripOf(page)).toEqual(strip(3));
    bench.server.clock.advance(minute);
    page = await shop.read(
      page.id,
      arrival.map((volts) => volts + 0.001),
    );
    expect(stripOf(page)).toEqual(strip(3));
    const spareId = await bench.spare('S-0417');
    page = await taken(shop.send(`repairs/${page.id}/spare`, { spareId }));
    expect(stripOf(page)).toEqual(strip(4));

    bench.server.clock.advance(minute);
    page = await shop.read(page.id, [...arrival].reverse());
    expect([page.failing, page.target, page.waits]).toEqual(['3', null, false]);
    expect(stripOf(page)).toEqual(strip(1));
    // The spare stays with the repair: nobody else takes it meanwhile.
    expect(page.spare).toMatchObject({ id: spareId });
    page = await shop.confirm(page, { modulePosition: '3', groupVolts: [3.916, 3.853] });
    page = await shop.take(page);
    page = await taken(shop.send(`repairs/${page.id}/spare`, { spareId }));
    expect(stripOf(page)).toEqual(strip(4));
  });
});

describe('the second source', () => {
  beforeEach(async () => {
    page = await shop.read(page.id, arrival);
  });
  const decide = (body: object, role: 'technician' | 'foreman' = 'foreman') =>
    shop.send(
      `repairs/${page.id}/second-source/${page.sources[0]!.id}/decision`,
      { reason: 'Read at the busbar.', ...body },
      role,
    );

  test('agrees within the offset of the two instruments, which a healthy group takes out', async () => {
    const apart = { groupVolts: [3.892, 3.955], healthyGroup: { group: 7, volts: 3.989 } };
    page = await shop.confirm(page, apart);
    expect(page.sources[0]).toMatchObject({ agrees: true, offsetMillivolts: 40 });
  });

  test('that reads otherwise blocks with the groups that differ; nothing is taken or planned before the decision', async () => {
    page = await shop.confirm(page, { groupVolts: [3.95, 3.949], pointsTo: '3' });
    expect(page.sources[0]).toMatchObject({ agrees: false, pointsTo: '3' });
    expect(page.sources[0]!.differs.map(({ group, millivolts }) => [group, Math.round(millivolts)])).toEqual([
      [2, 97],
      [3, 33],
    ]);
    expect(page.block).toEqual({
      code: 'sources-disagree',
      text: 'The pack says module 2, your meter says 3.',
      role: 'foreman',
    });
    expect([stripOf(page), page.needsSomebody]).toEqual([strip(1, 'blocked'), true]);
    const target = { readingId: page.readings[0]!.id, volts: null, toleranceMillivolts: 5, reason: null };
    const spareId = await bench.spare('S-0417');
    for (const [path, body] of [
      ['target', target],
      ['spare', { spareId }],
    ] as const) {
      const answer = await shop.send(`repairs/${page.id}/${path}`, body);
      expect([answer.status, answer.body.code]).toEqual([409, 'sources_disagree']);
      expect(answer.body.detail).toBe(
        'The pack says module 2, your meter says 3. A foreman or manager decides before it goes on.',
      );
    }
    await expect(shop.plan(page, spareId)).rejects.toThrow();

    expect((await decide({ decision: 'module', modulePosition: '3' }, 'technician')).status).toBe(403);
    expect((await decide({ decision: 'module', modulePosition: '9' })).body.fields.modulePosition).toContain(
      'no module 9',
    );
    page = await taken(decide({ decision: 'module', modulePosition: '3' }));
    expect(page).toMatchObject({ failing: '3', block: null });
    expect(page.sources[0]!.decided).toMatchObject({ reason: 'Read at the busbar.', by: { name: 'Foreman of own' } });
    expect(stripOf(page)).toEqual(strip(2));
    expect(page.steps[1]!.by).toEqual({ id: 'own-foreman', name: 'Foreman of own' });
    expect((await decide({ decision: 'module', modulePosition: '2' })).status).toBe(409);
    // The target leaves out the module that was decided, and the odd groups all the same.
    expect(page.computed!.healthy).toBe(4);
  });

  test('decided as to be read again, the pack’s reading stands no more until there is a new one', async () => {
    page = await shop.confirm(page, { pointsTo: '3' });
    page = await taken(decide({ decision: 'read-again', modulePosition: null }));
    expect([stripOf(page), page.block]).toEqual([strip(0), null]);
    bench.server.clock.advance(minute);
    page = await shop.read(page.id, arrival);
    expect(stripOf(page)).toEqual(strip(1));
  });

  test('is decided by a technician too while the workshop says so and no longer, and the session knows it', async () => {
    const manager = bench.as('manager');
    await manager.patch('/api/workshop', { technicianDecides: true }).set('If-Match', '"1"').expect(200);
    expect((await manager.get('/api/workshop')).body).toMatchObject({ technicianDecides: true });
    const session = await bench.as('technician').get('/api/session');
    expect((session.body as { capabilities: string[] }).capabilities).toContain('repair:decide');
    page = await shop.confirm(page, { pointsTo: '3' });
    expect(page.block!.role).toBeNull();
    const setTo = (technicianDecides: boolean, rev: number) =>
      manager.patch('/api/workshop', { technicianDecides }).set('If-Match', `"${rev}"`).expect(200);
    await setTo(false, 2);
    expect((await shop.seen(page.id)).block!.role).toBe('foreman');
    expect((await decide({ decision: 'module', modulePosition: '2' }, 'technician')).status).toBe(403);
    await setTo(true, 3);
    page = await taken(decide({ decision: 'module', modulePosition: '2' }, 'technician'));
    expect(page.failing).toBe('2');
    expect(page.sources[0]!.decided!.by.name).toBe('Technician of own');
  });

  test('names a module, a group and a number of voltages that the pack has, or is refused at its field', async () => {
    const fieldsOf = async (change: object) =>
      Object.keys(
        (await shop.send(`repairs/${page.id}/second-source`, secondSourceForm(page.readings[0]!.id, change))).body
          .fields as object,
      );
    expect(await fieldsOf({ modulePosition: '9' })).toEqual(['modulePosition']);
    expect(await fieldsOf({ groupVolts: ['3.9'] })).toEqual(['groupVolts']);
    expect(await fieldsOf({ healthyGroup: { group: 2, volts: 3.9 } })).toEqual(['healthyGroup.group']);
    expect(await fieldsOf({ healthyGroup: { group: 8, volts: 3.9 } })).toEqual(['healthyGroup.group']);
    expect(await fieldsOf({ readingId: 'nobody-has-this' })).toEqual(['readingId']);
  });

  test('is not taken from the display of a charger, which cannot reach a module in the pack', async () => {
    const { manager } = bench.server.deps.dataSource;
    await manager.update(Charger, { retired: false }, { meterId: bench.meterId });
    const answer = await shop.send(
      `repairs/${page.id}/second-source`,
      secondSourceForm(page.readings[0]!.id, { meterId: bench.meterId }),
    );
    expect([answer.status, answer.body.fields.meterId]).toEqual([
      400,
      expect.stringMatching(/ is the display of a charger\. Read the module with a hand meter\.$/) as string,
    ]);
    expect((await shop.seen(page.id)).sources).toEqual([]);
  });

  test('where no group stands out the repair says so, and the hand meter alone needs somebody’s decision', async () => {
    bench.server.clock.advance(minute);
    page = await shop.read(page.id, levelled(2));
    expect(page).toMatchObject({ failing: null, block: { code: 'module-unknown' } });
    expect(stripOf(page)).toEqual(strip(1, 'blocked'));
    page = await shop.confirm(page, { groupVolts: [3.95, 3.948] });
    expect(page.block).toMatchObject({
      code: 'sources-disagree',
      text: 'The pack points to no module, your meter to 2.',
    });
  });
});

describe('the target', () => {
  beforeEach(async () => {
    page = await shop.read(page.id, arrival);
  });
  const take = (change: object) =>
    shop.send(`repairs/${page.id}/target`, {
      readingId: page.readings[0]!.id,
      volts: null,
      toleranceMillivolts: 5,
      reason: null,
      ...change,
    });

  test('is the median of the healthy groups; another needs a reason and lies in the window of the type', async () => {
    // Without module 2: 3.948 3.949 3.949 3.949 3.950 3.951.
    expect(page.computed).toMatchObject({ volts: 3.949, healthy: 6 });
    expect((await take({ volts: 3.94 })).body.fields).toEqual({
      reason: 'Say why another target than the computed one is taken.',
    });
    expect(Object.keys((await take({ volts: 4.35, reason: 'x' })).body.fields as object)).toEqual(['volts']);
    const typed = await taken(take({ volts: 3.94, reason: 'It is driven home first' }));
    expect(typed.target).toMatchObject({ volts: 3.94, typed: true, reason: 'It is driven home first' });
    expect(typed.events[0]!.text).toBe(
      'took 3.940\u00a0V as the target in place of 3.949\u00a0V: It is driven home first',
    );
  });

  test('loses trust as its reading grows old', async () => {
    expect(page.computed!.reasons).not.toContain('old-reading');
    bench.server.clock.advance(30 * hour);
    expect((await shop.seen(page.id)).computed!.reasons).toContain('old-reading');
  });

  test('of a pack without a module type has no slope and is never trusted fully', async () => {
    const bare = await shop.book({
      pack: { moduleTypeId: null, groupCount: 8, groupsPerModule: 2, positionOfGroup: null },
    });
    const { computed, readings, forecast } = await shop.read(bare.id, arrival);
    expect(computed).toMatchObject({ volts: 3.949, slopeMillivoltsPerPercent: null });
    expect(computed!.trust).not.toBe('good');
    expect([readings[0]!.groupAmpHours, readings[0]!.spreadAmpHours, forecast]).toEqual([null, null, null]);
  });
});
