import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ChargerDto } from '@/shared/contract/equipment';
import type { PlanDto } from '@/shared/contract/plan';
import { channelForm, chargerForm, planForm } from '../../support/forms';
import { makeTestServer, type TestAgent, type TestServer } from '../../support/server';
import { created, stock, type Stocked } from '../../support/stocked';

let server: TestServer;
let manager: TestAgent;
let other: TestAgent;
let stocked: Stocked;

beforeAll(async () => {
  server = await makeTestServer();
  manager = server.agentFor('manager');
  other = server.agentFor('manager', server.other);
  stocked = await stock(manager);
});
afterAll(() => server.close());

const read = async (id: string): Promise<ChargerDto> => (await manager.get(`/api/chargers/${id}`).expect(200)).body;
const typedChannel = ({ id, name }: { id: string; name: string }, change: object = {}) =>
  channelForm({ id, name, ...change });

describe('chargers', () => {
  it('carry their channels, free until a charge has them', async () => {
    const answer = await server.agentFor('technician').get('/api/chargers').expect(200);
    expect(answer.body).toMatchObject([
      {
        name: 'Supply B',
        place: 'bench 2',
        retired: false,
        channels: [{ name: 'B1', maxAmps: 20, maxVolts: 30, leadMilliohm: 5, heldBy: null, chargerName: 'Supply B' }],
      },
    ]);
  });

  it('say the wrong field of the second channel under its own path', async () => {
    const answer = await manager
      .post(
        '/api/chargers',
        chargerForm({
          name: 'E',
          channels: [channelForm({ name: 'E1' }), channelForm({ name: 'E2', maxAmps: 'ten' })],
        }),
      )
      .expect(400);
    expect(answer.body.fields).toEqual({ 'channels.1.maxAmps': '“ten” is no number. Type it like 3.968.' });
  });

  it('refuse a channel’s name that the workshop has, and one that stands there twice', async () => {
    const taken = await manager.post('/api/chargers', chargerForm({ name: 'E' })).expect(409);
    expect(taken.body.fields).toEqual({
      'channels.0.name': 'There is a channel called B1 already. Choose another name.',
    });
    const twice = await manager
      .post(
        '/api/chargers',
        chargerForm({ name: 'E', channels: [channelForm({ name: 'E1' }), channelForm({ name: 'E1' })] }),
      )
      .expect(400);
    expect(twice.body.fields).toEqual({ 'channels.1.name': 'E1 stands here twice. Each channel has its own name.' });
  });

  it('refuse a meter of another workshop like one that is not there', async () => {
    for (const meterId of [stocked.meter.id, 'no-such-meter']) {
      const answer = await other.post('/api/chargers', chargerForm({ meterId })).expect(400);
      expect(answer.body.fields).toEqual({ meterId: 'This meter is not on the list. Choose another.' });
    }
  });

  it('retire the channel that is left out, keep the others’ ids and bring it back by its name', async () => {
    const made = await created<ChargerDto>(
      manager,
      '/api/chargers',
      chargerForm({ name: 'Supply C', channels: [channelForm({ name: 'C1' }), channelForm({ name: 'C2' })] }),
    );
    const [first, second] = made.channels;
    const without = await manager
      .patch(
        `/api/chargers/${made.id}`,
        chargerForm({ name: 'Supply C', channels: [typedChannel(first!, { maxAmps: '25' })] }),
      )
      .set('If-Match', '"1"')
      .expect(200);
    expect((without.body as ChargerDto).channels).toMatchObject([{ id: first!.id, name: 'C1', maxAmps: 25 }]);
    const back = await manager
      .patch(
        `/api/chargers/${made.id}`,
        chargerForm({ name: 'Supply C', channels: [typedChannel(first!), channelForm({ name: 'C2' })] }),
      )
      .set('If-Match', '"2"')
      .expect(200);
    expect((back.body as ChargerDto).channels.map(({ id }) => id)).toEqual([first!.id, second!.id]);
    const stale = await manager.patch(`/api/chargers/${made.id}`, chargerForm()).set('If-Match', '"1"').expect(412);
    expect(stale.body.present).toMatchObject({ name: 'Supply C', rev: 3 });
  });

  it('refuse the id of another charger’s channel', async () => {
    const made = await created<ChargerDto>(
      manager,
      '/api/chargers',
      chargerForm({ name: 'Supply F', channels: [channelForm({ name: 'F1' })] }),
    );
    const answer = await manager
      .patch(
        `/api/chargers/${made.id}`,
        chargerForm({ name: 'Supply F', channels: [channelForm({ id: stocked.charger.channels[0]!.id, name: 'F9' })] }),
      )
      .set('If-Match', '"1"')
      .expect(400);
    expect(answer.body.fields).toEqual({ 'channels.0.id': 'This channel is not one of this charger’s.' });
  });

  it('out of service are no longer offered by plans, and come back with a change', async () => {
    const made = await created<ChargerDto>(
      manager,
      '/api/chargers',
      chargerForm({ name: 'Supply D', channels: [channelForm({ name: 'D1' })] }),
    );
    const planned = async (): Promise<string[]> => {
      const { body } = await manager.post('/api/plans', planForm(stocked.spare.id)).expect(200);
      return Object.values((body as PlanDto).channels).map(({ name }) => name);
    };
    expect(await planned()).toContain('D1');
    await manager.delete(`/api/chargers/${made.id}`).set('If-Match', '"1"').expect(204);
    expect(await read(made.id)).toMatchObject({ retired: true, rev: 2 });
    expect(await planned()).not.toContain('D1');
    await manager
      .patch(`/api/chargers/${made.id}`, chargerForm({ name: 'Supply D', channels: [typedChannel(made.channels[0]!)] }))
      .set('If-Match', '"2"')
      .expect(200);
    expect(await planned()).toContain('D1');
  });

  it('of another workshop are unknown: 404', async () => {
    const path = `/api/chargers/${stocked.charger.id}`;
    await other.get(path).expect(404);
    await other.patch(path, chargerForm()).set('If-Match', '"1"').expect(404);
    await other.delete(path).set('If-Match', '"1"').expect(404);
    expect((await other.get('/api/chargers')).body).toEqual([]);
  });
});
