import { describe, expect, it } from 'vitest';
import { ApiProblem } from '@/shared/client/api-problem';
import type { WaitingDraft } from '@/shared/client/waiting/waiting-write';
import { at, charge, device, epoch, minute, refusal, restCheck, volts, type Arrival } from './waiting-device';

describe('what the server does not take', () => {
  async function waited(drafts: WaitingDraft[], refuse: (arrival: Arrival) => ApiProblem | null) {
    const world = device();
    const queue = await world.open();
    world.server.away = true;
    for (const draft of drafts) await queue.write(draft);
    Object.assign(world.server, { away: false, refuse });
    await queue.flush();
    return { ...world, queue };
  }

  it('stays with the reason, is not sent again, and holds nothing up', async () => {
    const { server, queue } = await waited([volts(24)], refusal(409, 'wrong_stage', 'The charge is over.'));
    expect(queue.store.get().map((one) => one.refused)).toEqual([{ code: 'wrong_stage', text: 'The charge is over.' }]);
    server.refuse = null;
    await queue.flush();
    expect(server.arrived).toEqual([]);
    await queue.write(volts(40));
    expect(server.arrived.map((one) => one.at)).toEqual([at(40)]);
    await queue.remove(queue.store.get()[0]!.key);
    expect(queue.store.get()).toEqual([]);
  });

  it('is sent in its place once it is typed anew, under its own key', async () => {
    const { server, queue } = await waited(
      [volts(24)],
      () => new ApiProblem({ status: 400, code: 'invalid', fields: { amps: '120.0 A is over twice the planned.' } }),
    );
    const [one] = queue.store.get();
    expect(one!.refused!.text).toBe('120.0 A is over twice the planned.');
    server.refuse = null;
    await queue.replace(one!.key, { input: { at: at(24), amps: 12 } });
    await queue.flush();
    expect(server.arrived).toMatchObject([{ key: one!.key, at: at(24) }]);
    expect(queue.store.get()).toEqual([]);
  });

  it('at once is thrown to the form and does not wait', async () => {
    const { server, open } = device();
    const queue = await open();
    server.refuse = () => new ApiProblem({ status: 400, code: 'invalid', fields: { amps: 'Too much.' } });
    await expect(queue.write(volts(24))).rejects.toMatchObject({ fields: { amps: 'Too much.' } });
    await queue.reload();
    expect(queue.store.get()).toEqual([]);
  });

  it('because it stumbles (500) is tried later; the later ones of that charge wait behind it, other charges go on', async () => {
    const stumbles = ({ path, at: when }: Arrival) =>
      path.includes('/c1/') && when === at(24) ? new ApiProblem({ status: 500, code: 'internal' }) : null;
    const { server, queue } = await waited([volts(24), volts(25, 'c2'), volts(36)], stumbles);
    expect(server.arrived.map((one) => one.at)).toEqual([at(25)]);
    expect(queue.store.get().map((one) => one.refused)).toEqual([null, null]);
    server.refuse = null;
    await queue.flush();
    expect(server.arrived.map((one) => one.at)).toEqual([at(25), at(24), at(36)]);
  });

  it('because it was done before the answer was lost counts as sent; while it is under way it waits', async () => {
    const { unknown, queue } = await waited([volts(24)], refusal(409, 'done_already'));
    expect([queue.store.get(), unknown]).toEqual([[], ['c1']]);
    const { queue: other } = await waited([volts(24)], refusal(409, 'still_running'));
    expect(other.store.get().map((one) => one.refused)).toEqual([null]);
  });

  it('because it was taken as it was before a change says so (422)', async () => {
    const { queue } = await waited([volts(24)], refusal(422, 'key_reused'));
    expect(queue.store.get()[0]!.refused!.text).toMatch(/^It was taken already, as it was before your change\./);
  });
});

describe('a check after the rest that waited', () => {
  const moved = (present: object) => (arrival: Arrival) =>
    arrival.rev === 7
      ? new ApiProblem({ status: 412, code: 'stale', detail: 'Bram checked it at 14:32.', present })
      : null;
  const flushed = async (present: object) => {
    const { server, open } = device();
    const queue = await open();
    server.away = true;
    await queue.write(restCheck(50, 7, 0));
    Object.assign(server, { away: false, refuse: moved(present) });
    await queue.flush();
    return { server, queue };
  };

  it('goes on top of a charge that has only gone on by the clock, or by own readings', async () => {
    const { server, queue } = await flushed({ stage: 'check-due', rev: 9, restChecks: [] });
    expect(server.arrived).toMatchObject([{ path: '/charges/c1/rest-check', rev: 9, at: at(50) }]);
    expect(queue.store.get()).toEqual([]);
  });

  it.each([
    ['somebody has checked meanwhile', { stage: 'check-due', rev: 9, restChecks: [{}] }],
    ['it rests no more', { stage: 'held', rev: 9, restChecks: [] }],
  ])('waits for a decision where %s', async (_why, present) => {
    const { server, queue } = await flushed(present);
    expect(server.arrived).toEqual([]);
    expect(queue.store.get()[0]!.refused).toEqual({ code: 'stale', text: 'Bram checked it at 14:32.' });
  });
});

describe('a device whose clock was set while something waited', () => {
  async function doubtful() {
    const world = device();
    Object.assign(world.clock, { now: epoch + 7 * minute, offsetMs: -7 * minute });
    const queue = await world.open();
    world.server.away = true;
    await queue.write({ kind: 'reading', ...charge(), input: { amps: 10 } });
    // Set right, back by 7 min; once the server is heard again that is measured.
    Object.assign(world.clock, { now: epoch + 5 * minute, offsetMs: 0 });
    world.server.away = false;
    await queue.flush();
    return { ...world, queue };
  }

  it('asks when it was, with both instants, instead of guessing', async () => {
    const { server, queue } = await doubtful();
    expect(server.arrived).toEqual([]);
    expect(queue.store.get()).toMatchObject([{ input: { at: at(0) }, refused: { code: 'clock', otherAt: at(7) } }]);
  });

  it.each([
    ['as it was logged', undefined, at(0)],
    ['by the other setting', at(7), at(7)],
  ])('sends it %s when a person says so', async (_words, said, arrives) => {
    const { server, queue } = await doubtful();
    await queue.settle(queue.store.get()[0]!.key, said);
    await queue.flush();
    expect(server.arrived.map((one) => one.at)).toEqual([arrives]);
  });

  it('is not asked over half a minute', async () => {
    const { server, clock, open } = device();
    const queue = await open();
    server.away = true;
    await queue.write(volts(24));
    Object.assign(server, { away: false });
    clock.offsetMs = 30_000;
    await queue.flush();
    expect(server.arrived).toHaveLength(1);
  });
});

it('what has waited for over 30 days is not sent by itself: the server may have forgotten its key', async () => {
  const { server, clock, open } = device();
  const queue = await open();
  server.away = true;
  await queue.write(volts(24));
  server.away = false;
  clock.now += 31 * 24 * 60 * minute;
  await queue.flush();
  expect([server.arrived, queue.store.get()[0]!.refused!.code]).toEqual([[], 'too-old']);
  await queue.settle(queue.store.get()[0]!.key);
  await queue.flush();
  expect(server.arrived.map((one) => one.at)).toEqual([at(24)]);
});
