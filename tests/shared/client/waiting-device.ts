/** A device with its waiting writes, for the tests of the queue. */
import type { ChargeDto } from '@/shared/contract/charge';
import { ApiProblem, OfflineError } from '@/shared/client/api-problem';
import { makeWaitingQueue } from '@/shared/client/waiting/waiting-queue';
import type { WaitingDraft, WaitingWrite } from '@/shared/client/waiting/waiting-write';

export interface Arrival {
  path: string;
  at: string;
  key: string;
  rev?: number;
}

export const minute = 60_000;
export const epoch = Date.parse('2026-06-09T11:00:00.000Z');

/**
 * A device with a disk, and a server that can be away or refuse. Each arrival is noted with its idempotency key; a key
 * that has arrived is not counted again, as the server does it.
 */
export function device() {
  const disk = new Map<string, string>();
  const server = {
    away: false,
    /** The answer of the next arrivals is lost on its way. */
    loses: false,
    refuse: null as ((arrival: Arrival) => ApiProblem | null) | null,
    arrived: [] as Arrival[],
    tries: 0,
  };
  /** The phone's own clock, and what it is off. */
  const clock = { now: epoch, offsetMs: 0 };
  const sent: ChargeDto[] = [];
  const unknown: string[] = [];
  let locked: Promise<unknown> = Promise.resolve();
  const load = async (person: string) => JSON.parse(disk.get(person) ?? '[]') as WaitingWrite[];
  const post = async <T>(path: string, body: unknown, options?: { idempotencyKey?: string; rev?: number }) => {
    server.tries += 1;
    await Promise.resolve();
    if (server.away) throw new OfflineError();
    const arrival = { path, at: (body as { at: string }).at, key: options!.idempotencyKey!, rev: options?.rev };
    const refusal = server.refuse?.(arrival);
    if (refusal) throw refusal;
    if (!server.arrived.some(({ key }) => key === arrival.key)) server.arrived.push(arrival);
    if (server.loses) throw new OfflineError();
    return { id: path.split('/')[2] } as T;
  };
  /** A page that is opened on this device, as it is after a restart or as a second tab. */
  const boot = () =>
    makeWaitingQueue({
      post,
      load,
      change: async (person, change) => {
        const next = change(await load(person));
        disk.set(person, JSON.stringify(next));
        return next;
      },
      alone: (_name, work) => {
        const run = locked.then(work, work);
        locked = run.catch(() => undefined);
        return run;
      },
      isDown: () => false,
      deviceNow: () => clock.now,
      offsetMs: () => clock.offsetMs,
      freshOffsetMs: async () => clock.offsetMs,
      wait: (ms) => new Promise((resolve) => setTimeout(resolve, ms)),
      sent: (charge) => void sent.push(charge),
      unknown: (id) => void unknown.push(id),
    });
  const open = async (person = 'ines') => {
    const queue = boot();
    await queue.belongTo(person);
    return queue;
  };
  return { server, clock, sent, unknown, boot, open };
}

export const at = (past: number) => new Date(epoch + past * minute).toISOString();
export const charge = (id = 'c1') => ({ chargeId: id, title: `R-${id}` });
export const volts = (past: number, id?: string): WaitingDraft => ({
  kind: 'reading',
  ...charge(id),
  input: { at: at(past), terminalVolts: 11.64, amps: 10, celsius: 24 },
});
export const lookIn = (past: number, id?: string): WaitingDraft => ({
  kind: 'look-in',
  ...charge(id),
  input: { at: at(past) },
});
export const restCheck = (past: number, rev = 7, checks = 0): WaitingDraft => ({
  kind: 'rest-check',
  ...charge(),
  rev,
  checks,
  input: { at: at(past), groupVolts: [3.957, 3.958], celsius: 21, meterId: 'm1' },
});
export const answer = (past: number, code: 'isolation' | 'polarity', given: 'yes' | 'no'): WaitingDraft => ({
  kind: 'answer',
  ...charge(),
  said: `${code}: ${given}`,
  input: { at: at(past), code, answer: given, asked: 'Is it?' },
});
export const refusal =
  (status: number, code: string, detail = 'No.', more: object = {}) =>
  () =>
    new ApiProblem({ status, code, detail, ...more });
