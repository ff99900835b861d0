import { describe, expect, it } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import { ApiProblem, OfflineError } from '@/shared/client/api-problem';
import { makeReadingQueue, type WaitingReading } from '@/shared/client/reading-queue';

/** A device with a disk, and a server that can be away or refuse. Each arrival is noted with its idempotency key. */
function device() {
  const disk = new Map<string, string>();
  const server = {
    away: false,
    refuse: null as ApiProblem | null,
    arrived: [] as { path: string; at: string; key: string }[],
  };
  const sent: ChargeDto[] = [];
  const boot = () =>
    makeReadingQueue({
      post: async <T>(path: string, body: unknown, options?: { idempotencyKey?: string }) => {
        if (server.away) throw new OfflineError();
        if (server.refuse) throw server.refuse;
        server.arrived.push({ path, at: (body as { at: string }).at, key: options!.idempotencyKey! });
        return { id: 'c1' } as T;
      },
      load: (person) => JSON.parse(disk.get(person) ?? '[]') as WaitingReading[],
      save: (person, waiting) => void disk.set(person, JSON.stringify(waiting)),
      sent: (charge) => void sent.push(charge),
    });
  return { server, sent, boot };
}

const at = (minute: number) => `2026-06-09T11:${minute}:00.000Z`;
const volts = (minute: number) => ({ at: at(minute), terminalVolts: 11.64, amps: 10, celsius: 24 });

describe('readings without a connection', () => {
  it('go straight through while there is one', async () => {
    const { server, boot } = device();
    const queue = boot();
    queue.belongTo('ines');
    expect(await queue.log('c1', volts(24))).toEqual({ id: 'c1' });
    expect(server.arrived).toHaveLength(1);
    expect(queue.store.get()).toEqual([]);
  });

  it('wait on the device, survive a restart of the page, and are sent once each in their order', async () => {
    const { server, boot } = device();
    const first = boot();
    first.belongTo('ines');
    server.away = true;
    expect(await first.log('c1', volts(24))).toBeNull();
    expect(await first.log('c1', volts(36))).toBeNull();

    const again = boot();
    again.belongTo('ines');
    expect(again.store.get()).toHaveLength(2);
    server.away = false;
    await Promise.all([again.flush(), again.flush()]);
    expect(server.arrived.map((one) => one.at)).toEqual([at(24), at(36)]);
    expect(new Set(server.arrived.map((one) => one.key)).size).toBe(2);
    expect(again.store.get()).toEqual([]);
  });

  it('keep the time they were read at', async () => {
    const { server, boot } = device();
    const queue = boot();
    queue.belongTo('ines');
    server.away = true;
    await queue.log('c1', { terminalVolts: 11.6 });
    const waiting = queue.store.get()[0]!;
    expect(Math.abs(Date.parse(waiting.input.at) - Date.now())).toBeLessThan(5000);
    server.away = false;
    await queue.flush();
    expect(server.arrived[0]!.at).toBe(waiting.input.at);
  });

  it('go before a later one: the finish moves with each reading in its order', async () => {
    const { server, boot } = device();
    const queue = boot();
    queue.belongTo('ines');
    server.away = true;
    await queue.log('c1', volts(24));
    server.away = false;
    await queue.log('c1', volts(36));
    expect(server.arrived.map((one) => one.at)).toEqual([at(24), at(36)]);
  });

  it('that the server refuses stay with the reason, are not sent again, and hold nothing up', async () => {
    const { server, boot } = device();
    const queue = boot();
    queue.belongTo('ines');
    server.away = true;
    await queue.log('c1', volts(24));
    server.away = false;
    server.refuse = new ApiProblem({ status: 409, code: 'over', detail: 'The charge is over.' });
    await queue.flush();
    expect(queue.store.get().map((one) => one.refused)).toEqual(['The charge is over.']);
    server.refuse = null;
    await queue.flush();
    expect(server.arrived).toEqual([]);
    await queue.log('c2', volts(40));
    expect(server.arrived.map((one) => one.path)).toEqual(['/charges/c2/readings']);
    queue.remove(queue.store.get()[0]!.key);
    expect(queue.store.get()).toEqual([]);
  });

  it('refused at once are thrown to the form and do not wait', async () => {
    const { server, boot } = device();
    const queue = boot();
    queue.belongTo('ines');
    server.refuse = new ApiProblem({ status: 400, code: 'invalid', fields: { amps: 'Too much.' } });
    await expect(queue.log('c1', volts(24))).rejects.toMatchObject({ fields: { amps: 'Too much.' } });
    expect(queue.store.get()).toEqual([]);
  });

  it('wait for their own person: nobody else sends them', async () => {
    const { server, boot } = device();
    const queue = boot();
    queue.belongTo('ines');
    server.away = true;
    await queue.log('c1', volts(24));
    server.away = false;
    queue.belongTo('bram');
    await queue.flush();
    expect([queue.store.get(), server.arrived]).toEqual([[], []]);
    queue.belongTo('ines');
    await queue.flush();
    expect(server.arrived).toHaveLength(1);
  });

  it('wait for a new sign-in when the session has ended', async () => {
    const { server, boot } = device();
    const queue = boot();
    queue.belongTo('ines');
    server.away = true;
    await queue.log('c1', volts(24));
    server.away = false;
    server.refuse = new ApiProblem({ status: 401, code: 'unauthenticated' });
    await queue.flush();
    expect(queue.store.get()[0]!.refused).toBeNull();
  });
});
