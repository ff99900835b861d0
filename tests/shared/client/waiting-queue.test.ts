import { describe, expect, it, vi } from 'vitest';
import { makeWaitingQueue } from '@/shared/client/waiting/waiting-queue';
import type { WaitingWrite } from '@/shared/client/waiting/waiting-write';
import { answer, at, charge, device, epoch, lookIn, minute, refusal, restCheck, volts } from './waiting-device';

describe('what is logged without a connection', () => {
  it('goes straight through while there is one, and is on no list then', async () => {
    const { server, sent, open } = device();
    const queue = await open();
    const shown: number[] = [];
    queue.store.subscribe(() => shown.push(queue.store.get().length));
    expect(await queue.write(volts(24))).toEqual({ id: 'c1' });
    expect([server.arrived.length, sent.length, queue.store.get()]).toEqual([1, 1, []]);
    expect(shown.filter((count) => count > 0)).toEqual([]);
  });

  it('waits on the device, survives a restart of the page, and is sent once each in its order, whatever it is', async () => {
    const { server, open } = device();
    const first = await open();
    server.away = true;
    for (const draft of [volts(24), lookIn(30), answer(33, 'isolation', 'yes'), volts(36), restCheck(50)])
      expect(await first.write(draft)).toBeNull();

    const again = await open();
    expect(again.store.get().map(({ kind }) => kind)).toEqual([
      'reading',
      'look-in',
      'answer',
      'reading',
      'rest-check',
    ]);
    server.away = false;
    await Promise.all([again.flush(), again.flush()]);
    expect(server.arrived.map(({ path, at: when }) => `${path} ${when}`)).toEqual([
      `/charges/c1/readings ${at(24)}`,
      `/charges/c1/look-ins ${at(30)}`,
      `/charges/c1/checks ${at(33)}`,
      `/charges/c1/readings ${at(36)}`,
      `/charges/c1/rest-check ${at(50)}`,
    ]);
    expect(new Set(server.arrived.map((one) => one.key)).size).toBe(5);
    expect(again.store.get()).toEqual([]);
  });

  it('keeps the time it was done, by the server’s clock on a phone that is 7 min off', async () => {
    const { server, clock, open } = device();
    // The phone is 7 min ahead; that was measured while there was a connection.
    Object.assign(clock, { now: epoch + 7 * minute, offsetMs: -7 * minute });
    const queue = await open();
    server.away = true;
    await queue.write({ kind: 'reading', ...charge(), input: { terminalVolts: 11.6 } });
    await queue.write({ kind: 'look-in', ...charge(), input: {} });
    clock.now += 20 * minute;
    server.away = false;
    await queue.flush();
    expect(server.arrived.map((one) => one.at)).toEqual([at(0), at(0)]);
  });

  it('goes before a later one: the finish moves with each reading in its order', async () => {
    const { server, open } = device();
    const queue = await open();
    server.away = true;
    await queue.write(volts(24));
    server.away = false;
    await queue.write(volts(36));
    expect(server.arrived.map((one) => one.at)).toEqual([at(24), at(36)]);
  });

  it('whose answer was lost is sent again under its key, and counts once', async () => {
    const { server, open } = device();
    const queue = await open();
    server.loses = true;
    expect(await queue.write(volts(24))).toBeNull();
    server.loses = false;
    await queue.flush();
    expect([server.tries, server.arrived.length, queue.store.get()]).toEqual([2, 1, []]);
  });

  it('is not sent twice by two pages of one browser, and both see it gone', async () => {
    const { server, open } = device();
    const [one, other] = [await open(), await open()];
    server.away = true;
    await one.write(volts(24));
    await one.write(volts(36));
    await other.reload();
    expect(other.store.get()).toHaveLength(2);
    Object.assign(server, { away: false, tries: 0 });
    await Promise.all([one.flush(), other.flush()]);
    expect(server.tries).toBe(2);
    await other.reload();
    expect([one.store.get(), other.store.get()]).toEqual([[], []]);
  });

  it('waits for its own person: nobody else sees or sends it', async () => {
    const { server, open } = device();
    const queue = await open();
    server.away = true;
    await queue.write(volts(24));
    server.away = false;
    await queue.belongTo('bram');
    await queue.flush();
    expect([queue.store.get(), server.arrived]).toEqual([[], []]);
    await queue.belongTo(null);
    expect(queue.store.get()).toEqual([]);
    await queue.belongTo('ines');
    await queue.flush();
    expect(server.arrived).toHaveLength(1);
  });

  it('waits for a new sign-in when the session has ended', async () => {
    const { server, open } = device();
    const queue = await open();
    server.away = true;
    await queue.write(volts(24));
    Object.assign(server, { away: false, refuse: refusal(401, 'signed_out') });
    await queue.flush();
    expect(queue.store.get()[0]!.refused).toBeNull();
  });

  it('gives way to a later answer to the same check, and to no other', async () => {
    const { server, open } = device();
    const queue = await open();
    server.away = true;
    await queue.write(answer(20, 'isolation', 'no'));
    await queue.write(answer(21, 'polarity', 'yes'));
    await queue.write(answer(25, 'isolation', 'yes'));
    server.away = false;
    await queue.flush();
    expect(server.arrived.map((one) => one.at)).toEqual([at(21), at(25)]);
  });

  it('does not keep a form waiting for a server that does not answer: after 6 s it is told that it waits here', async () => {
    vi.useFakeTimers();
    try {
      let answerIt = () => {};
      let kept = '[]';
      const slow = makeWaitingQueue({
        post: <T>() => new Promise<T>((resolve) => (answerIt = () => resolve({ id: 'c1' } as T))),
        load: async () => JSON.parse(kept) as WaitingWrite[],
        change: async (_person, change) => {
          const next = change(JSON.parse(kept) as WaitingWrite[]);
          kept = JSON.stringify(next);
          return next;
        },
        alone: (_name, work) => work(),
        isDown: () => false,
        deviceNow: () => epoch,
        offsetMs: () => 0,
        freshOffsetMs: async () => 0,
        wait: (ms) => new Promise((resolve) => setTimeout(resolve, ms)),
        sent: () => {},
        unknown: () => {},
      });
      await slow.belongTo('ines');
      const written = slow.write(volts(24));
      await vi.advanceTimersByTimeAsync(6000);
      expect(await written).toBeNull();
      await vi.advanceTimersByTimeAsync(0);
      expect(slow.store.get()).toHaveLength(1);
      answerIt();
      await vi.advanceTimersByTimeAsync(0);
      expect(slow.store.get()).toEqual([]);
    } finally {
      vi.useRealTimers();
    }
  });
});
