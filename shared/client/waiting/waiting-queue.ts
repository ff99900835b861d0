/**
 * Readings, look-ins, checks and answers wait on this device until they are sent, once each and in their order: the key
 * of each is its idempotency key, so a second sending changes nothing. With a connection they are gone in a moment.
 */
import type { ChargeDto } from '@/shared/contract/charge';
import type { Alone } from '../alone';
import { newKey, type Api } from '../api';
import type { ApiProblem } from '../api-problem';
import { externalStore } from '../external-store';
import { sendWaiting } from './send-waiting';
import { isUnsent, type Refusal, type WaitingDraft, type WaitingChange, type WaitingWrite } from './waiting-write';

export interface QueueEnvironment {
  post: Api['post'];
  load: (personId: string) => Promise<WaitingWrite[]>;
  /** Changes the list in one go, whoever else does too, and gives it as it is then. */
  change: (personId: string, change: (list: WaitingWrite[]) => WaitingWrite[]) => Promise<WaitingWrite[]>;
  alone: Alone;
  /** The link is known to be down: a form waits for nothing. */
  isDown: () => boolean;
  deviceNow: () => number;
  /** Server minus device, ms; as known now, and measured anew after the connection has come back. */
  offsetMs: () => number;
  freshOffsetMs: () => Promise<number>;
  wait: (ms: number) => Promise<void>;
  sent: (charge: ChargeDto) => void;
  /** What became of a charge is not known: ask again. */
  unknown: (chargeId: string) => void;
}

/** A form waits so long for the server; then it is told that its write waits here, ms. */
const formWaitMs = 6000;
/** A device's clock that was set by more than this makes it doubtful when something was done, ms. */
const clockDoubtMs = 60_000;
/** The server knows a key for 45 days (server/services/idempotency.service.ts). */
export const keptForMs = 30 * 86_400_000;
const lockName = 'bidewell-waiting';

type Outcome = { charge: ChargeDto | null } | { problem: ApiProblem };

/** The queue of one device; per person. */
export function makeWaitingQueue(env: QueueEnvironment) {
  const store = externalStore<readonly WaitingWrite[]>([]);
  let person: string | null = null;
  let flushing: Promise<void> | null = null;
  let again = false;
  /** Writes whose form still waits: not shown as waiting, and told to the form when refused. */
  const inHand = new Map<string, (outcome: Outcome) => void>();

  const show = (owner: string, list: WaitingWrite[]) => {
    if (person === owner) store.set(list.filter(({ key }) => !inHand.has(key)));
  };
  async function change(owner: string, edit: (list: WaitingWrite[]) => WaitingWrite[]): Promise<void> {
    show(owner, await env.change(owner, edit));
  }
  const patch = (owner: string, key: string, to: Partial<Pick<WaitingWrite, 'refused' | 'offsetMs' | 'keptAt'>>) =>
    change(owner, (list) => list.map((one) => (one.key === key ? { ...one, ...to } : one)));
  const drop = (owner: string, key: string) => change(owner, (list) => list.filter((one) => one.key !== key));

  async function finish(owner: string, key: string, outcome: Outcome, keep?: Refusal): Promise<void> {
    const form = inHand.get(key);
    inHand.delete(key);
    // A form that is still there has what was typed: it is told, and nothing waits.
    if (keep && !form) await patch(owner, key, { refused: keep });
    else await drop(owner, key);
    form?.(outcome);
  }

  /** Why it cannot be sent as it is, before the server is asked. */
  function doubt(write: WaitingWrite, offsetMs: number): Refusal | null {
    if (env.deviceNow() - write.keptAt > keptForMs)
      return { code: 'too-old', text: 'It has waited for over 30 days. See whether the charge has it already.' };
    const set = offsetMs - write.offsetMs;
    if (Math.abs(set) <= clockDoubtMs) return null;
    return {
      code: 'clock',
      text: 'The clock of this device was set while it waited, so that its time is doubtful. Say when it was.',
      otherAt: new Date(Date.parse(write.input.at) + set).toISOString(),
    };
  }

  async function flushOnce(owner: string): Promise<void> {
    // What a form here has just typed stands by the clock it was typed with.
    const older = (await env.load(owner)).some((write) => isUnsent(write) && !inHand.has(write.key));
    const offsetMs = older ? await env.freshOffsetMs() : env.offsetMs();
    const held = new Set<string>();
    for (;;) {
      if (person !== owner) return;
      const list = await env.load(owner);
      show(owner, list);
      const next = list.find((write) => isUnsent(write) && !held.has(write.chargeId));
      if (!next) return;
      const doubtful = doubt(next, offsetMs);
      if (doubtful) {
        await patch(owner, next.key, { refused: doubtful });
        continue;
      }
      const result = await sendWaiting(env.post, next);
      if (result.kind === 'stop') {
        // The form keeps what was typed over the new sign-in; what waits already goes on waiting.
        if (result.problem && inHand.has(next.key)) await finish(owner, next.key, { problem: result.problem });
        return;
      }
      if (result.kind === 'later') held.add(next.chargeId);
      if (result.kind === 'sent') {
        env.sent(result.charge);
        await finish(owner, next.key, { charge: result.charge });
      }
      if (result.kind === 'done') {
        env.unknown(next.chargeId);
        await finish(owner, next.key, { charge: null });
      }
      if (result.kind === 'refused') await finish(owner, next.key, { problem: result.problem }, result.refusal);
    }
  }

  const run = async (): Promise<void> => {
    do {
      again = false;
      const owner = person;
      if (owner && (await env.load(owner)).some(isUnsent)) await env.alone(lockName, () => flushOnce(owner));
    } while (again);
  };

  const queue = {
    store,
    /** Whose writes; null: nobody is signed in, so nothing is shown and nothing is sent. */
    belongTo: async (personId: string | null): Promise<void> => {
      person = personId;
      store.set([]);
      if (personId) show(personId, await env.load(personId));
    },
    /** Another page of this browser has changed the list. */
    reload: async (): Promise<void> => {
      const owner = person;
      if (owner) show(owner, await env.load(owner));
    },
    /**
     * Sends it at once, behind what waits already, or keeps it here: gives the charge, or null when it waits. A refusal
     * is thrown, and then nothing is kept here: the form has it.
     */
    write: async (draft: WaitingDraft): Promise<ChargeDto | null> => {
      const owner = person;
      if (!owner) throw new Error('Nobody is signed in.');
      const offsetMs = env.offsetMs();
      const keptAt = env.deviceNow();
      const at = draft.input.at ?? new Date(keptAt + offsetMs).toISOString();
      const key = newKey();
      const write = { ...draft, input: { ...draft.input, at }, key, offsetMs, keptAt, refused: null } as WaitingWrite;
      const down = env.isDown();
      const outcome = new Promise<Outcome>((resolve) => {
        if (!down) inHand.set(key, resolve);
      });
      await change(owner, (list) => [...list.filter((one) => !isOverridden(one, write)), write]);
      const flushed = queue.flush();
      if (down) return null;
      const told = await Promise.race([outcome, flushed.then(() => null), env.wait(formWaitMs).then(() => null)]);
      if (inHand.delete(key)) void queue.reload();
      if (told === null) return null;
      if ('problem' in told) throw told.problem;
      return told.charge;
    },
    /** Sends what waits; one run at a time, also over all pages of this browser. */
    flush: (): Promise<void> => {
      if (flushing) again = true;
      flushing ??= run().finally(() => {
        flushing = null;
      });
      return flushing;
    },
    remove: async (key: string): Promise<void> => {
      if (person) await drop(person, key);
    },
    /** Puts what was typed anew in its place. It keeps its key: where the first was taken after all, the server says so. */
    replace: async (key: string, anew: WaitingChange): Promise<void> => {
      const owner = person;
      if (!owner) return;
      const fresh = { ...anew, refused: null, offsetMs: env.offsetMs(), keptAt: env.deviceNow() };
      await change(owner, (list) =>
        list.map((one) => (one.key === key ? ({ ...one, ...fresh } as WaitingWrite) : one)),
      );
      void queue.flush();
    },
    /** A person has said when it was, or to try it once more as it is. */
    settle: async (key: string, at?: string): Promise<void> => {
      const write = store.get().find((one) => one.key === key);
      if (write) await queue.replace(key, { input: { ...write.input, at: at ?? write.input.at } });
    },
  };
  return queue;
}

/** An answer to the same check that was not sent yet gives way to a later one. */
const isOverridden = (one: WaitingWrite, by: WaitingWrite): boolean =>
  one.kind === 'answer' && by.kind === 'answer' && one.chargeId === by.chargeId && one.input.code === by.input.code;
