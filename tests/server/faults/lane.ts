/** One channel of a bench and the charges that go over it, one after the other, with all that was answered as done. */
import type { ChargeCardDto, ChargeDto, Stage } from '@/shared/contract/charge';
import type { PlanDto } from '@/shared/contract/plan';
import { at, high, minute } from '../charges/bench';
import type { RepeatingClient } from './repeating-client';

/** A charge and what its person has done to it, in their order. */
export interface Life {
  id: string;
  did: string[];
}

export interface Lane {
  lives: Life[];
  /** Does the next thing that a person can do here. @returns false where only time can go on */
  act(): Promise<boolean>;
  /** When something happens here by itself, epoch ms; null: nothing does. */
  nextAt(): Promise<number | null>;
}

interface LaneParts {
  client: RepeatingClient;
  channelId: string;
  finish: 'over-and-settle' | 'on-the-mark';
  /** The next spare of the shelf. */
  takeSpare(): string;
  meterId: string;
  random(): number;
  now(): number;
}

/** Most interruptions of one charge. */
const MOST_HOLDS = 4;

let keys = 0;
const newKey = (): string => `kill-test-key-${(keys += 1)}`;

export function makeLane({ client, channelId, finish, takeSpare, meterId, random, now }: LaneParts): Lane {
  const lives: Life[] = [];
  let holds = 0;

  const seen = async (id: string): Promise<ChargeDto> => (await client.get(`/api/charges/${id}`)).body as ChargeDto;

  /** Keeps a plan for the next spare. What was committed and whose answer was lost is found on the list. */
  async function keep(): Promise<void> {
    const wish = {
      ...{ spareId: takeSpare(), targetVolts: high.volts, toleranceMillivolts: 5, meterId, packCelsius: 21 },
      ...{ readyBy: null, clipOnAt: null, repairRef: null, modulePosition: null },
    };
    const { plan } = (await client.post('/api/plans', wish)).body as PlanDto;
    const option = plan!.options.find((one) => one.finish === finish && one.channelIds[0] === channelId)!;
    const answer = await client.post('/api/charges', { ...wish, optionId: option.id }, { key: newKey() });
    let id = (answer.body as ChargeDto).id;
    if (answer.status === 409) {
      const open = (await client.get('/api/charges?open=1')).body as ChargeCardDto[];
      id = open.find((one) => one.spare.id === wish.spareId)!.id;
    } else if (answer.status !== 201) throw new Error(`Not kept: ${JSON.stringify(answer)}`);
    lives.push({ id, did: ['planned'] });
    holds = 0;
  }

  /** An act that the server has taken, in this try or in one before, goes into the book of the charge. */
  async function post(charge: ChargeDto, path: string, kind: string, body: object = {}): Promise<void> {
    const answer = await client.post(`/api/charges/${charge.id}/${path}`, body, { key: newKey(), rev: charge.rev });
    const { code } = (answer.body ?? {}) as { code?: string };
    if (answer.status === 200 || code === 'done_already') lives.at(-1)!.did.push(kind);
    // Time has gone on under the hand: the next look sees what is so now.
    else if (answer.status !== 412) throw new Error(`${path} at ${charge.stage}: ${JSON.stringify(answer)}`);
  }

  async function answerChecks(charge: ChargeDto): Promise<boolean> {
    const open = charge.checks.filter((item) => item.by === 'person' && item.answer === null);
    for (const { code } of open) await post(charge, 'checks', 'check', { code, answer: 'yes' });
    return open.length > 0;
  }

  const acts: Partial<Record<Stage, (charge: ChargeDto) => Promise<boolean>>> = {
    async planned(charge) {
      if (!(await answerChecks(charge))) await post(charge, 'start', 'started');
      return true;
    },
    async charging(charge) {
      // Not in the last minutes: an end of current between look and hand is tried often enough by the clock.
      if (holds >= MOST_HOLDS || random() < 0.4 || at(charge.currentEndAt) - now() < minute) return false;
      holds += 1;
      await post(charge, 'hold', 'held', { reason: 'looked at the clips' });
      return true;
    },
    async held(charge) {
      await post(charge, 'resume', 'resumed');
      return true;
    },
    async resting(charge) {
      if (lives.at(-1)!.did.includes('current-off')) return false;
      await post(charge, 'current-off', 'current-off');
      return true;
    },
    async 'check-due'(charge) {
      if (!lives.at(-1)!.did.includes('current-off')) await post(charge, 'current-off', 'current-off');
      else await post(charge, 'rest-check', 'ready', { groupVolts: ['3.949', '3.949'], celsius: '21', meterId });
      return true;
    },
    async ready(charge) {
      if (random() < 0.5) await post(charge, 'fit', 'fitted');
      else await post(charge, 'shelve', 'shelved', { shelfPlace: 'D1' });
      return true;
    },
  };

  const over: Stage[] = ['fitted', 'shelved'];
  return {
    lives,
    async act() {
      const life = lives.at(-1);
      const charge = life ? await seen(life.id) : null;
      if (charge === null || over.includes(charge.stage)) {
        await keep();
        return true;
      }
      return (await (acts[charge.stage] ?? acts.charging)?.(charge)) ?? false;
    },
    async nextAt() {
      const life = lives.at(-1);
      if (!life) return null;
      const charge = await seen(life.id);
      const ahead = [charge.taperAt, charge.currentEndAt, charge.checkDueAt, charge.nextLookInAt]
        .map(at)
        .filter((instant) => instant > now());
      return ahead.length === 0 ? null : Math.min(...ahead);
    },
  };
}
