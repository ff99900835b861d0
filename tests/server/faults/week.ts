/** A busy workshop lived through on a clock moved by hand: five channels, two shifts, a night that nobody is there. */
import { expect } from 'vitest';
import { seededRandom } from '@/calc/index';
import type { BenchPlanDto } from '@/shared/contract/bench-plan';
import type { ChargeDto } from '@/shared/contract/charge';
import { act, alertsOf, answered, at, hour, kept, key, makeBench, minute, seen, type Bench } from '../charges/bench';
import { makeTruths } from './week-truths';

export interface WeekPlan {
  /** Midnight in Berlin, as an instant. */
  from: string;
  days: number;
  seed: number;
  /** How often the server's clock is set an hour ahead or back, a day; left out: never. */
  jumpsADay?: number;
}

export interface WeekTold {
  events: number;
  acts: Record<string, number>;
  charges: number;
  transitions: number;
  alerts: number;
  jumps: number;
}

const lanes = [
  { channel: 'A1' },
  { channel: 'B1', finish: 'on-the-mark' as const },
  { channel: 'C1', way: 'group-by-group' as const },
  { channel: 'D1' },
  { channel: 'E1', finish: 'on-the-mark' as const },
];
const channels = [
  { name: 'A1' },
  { name: 'B1', maxAmps: 20 },
  { name: 'C1', maxAmps: 10, singleGroup: true, canDischarge: true, dischargeAmps: 10 },
  { name: 'D1' },
  { name: 'E1', maxAmps: 20 },
];

const clockHour = (now: number): number =>
  Number(new Intl.DateTimeFormat('en-GB', { timeZone: 'Europe/Berlin', hour: '2-digit', hour12: false }).format(now));

export async function liveWeek({ from, days, seed, jumpsADay = 0 }: WeekPlan): Promise<WeekTold> {
  const random = seededRandom(seed);
  const bench = await makeBench({ now: Date.parse(from), channels });
  const { clock, deps } = bench.server;
  const truths = makeTruths(bench);
  const told: WeekTold = { events: 0, acts: {}, charges: 0, transitions: 0, alerts: 0, jumps: 0 };
  const ids: (string | null)[] = lanes.map(() => null);
  const offSaid = new Set<string>();

  const happened = async (what: string): Promise<void> => {
    told.events += 1;
    await truths.hold(`seed ${seed}, event ${told.events} at ${new Date(clock.now()).toISOString()}, ${what}`);
  };

  /** Something that a person does. It may come too late; it may not fail. */
  async function post(charge: ChargeDto, what: string, body: object = {}): Promise<boolean> {
    const role = random() < 0.6 ? 'technician' : 'foreman';
    const answer = await act(bench, charge, what, body, role);
    expect(answer.status, `${what} at ${charge.stage}: ${JSON.stringify(answer.body).slice(0, 400)}`).toBeLessThan(500);
    if (answer.status === 200) told.acts[what] = (told.acts[what] ?? 0) + 1;
    return answer.status === 200;
  }

  async function plan(lane: number): Promise<void> {
    told.charges += 1;
    const spareId = await bench.spare(`S-${told.charges}`, [3.802, 3.802 + (lane === 2 ? 0.03 : 0.004) * random()]);
    ids[lane] = (await answered(bench, await kept(bench, { spareId }, lanes[lane]))).id;
  }

  /** What the next person who comes by does at one channel. */
  async function visit(lane: number): Promise<void> {
    const id = ids[lane];
    if (id === null || id === undefined) return plan(lane);
    const charge = await seen(bench, id);
    const volts = (off: number) => [3.949 + off, 3.949 - off / 2].map((one) => one.toFixed(3));
    switch (charge.stage) {
      case 'planned':
        return void (await post(charge, 'start'));
      case 'held':
        return void (await post(charge, 'resume'));
      case 'charging':
      case 'discharging':
      case 'tapering':
        return runs(charge);
      case 'resting':
        if (offSaid.has(id)) return void (await post(charge, 'look-ins', { note: null }));
        if (await post(charge, 'current-off')) offSaid.add(id);
        return;
      case 'check-due':
        if (random() < 0.15) return void (await post(charge, 'shelve', { shelfPlace: 'D2' }));
        return void (await post(charge, 'rest-check', {
          ...{ groupVolts: volts(random() < 0.8 ? 0.001 : 0.02), celsius: '21', meterId: null },
        }));
      case 'ready':
        return void (await post(charge, random() < 0.6 ? 'fit' : 'shelve', { shelfPlace: 'D1' }));
      default:
        ids[lane] = null;
    }
  }

  async function runs(charge: ChargeDto): Promise<void> {
    const dice = random();
    const swap = (await alertsOf(bench)).some(
      (one) => one.kind === 'step-swap' && one.chargeId === charge.id && one.clearedAt === null,
    );
    if (swap) await post(charge, 'next-step');
    else if (dice < 0.5) await post(charge, 'look-ins', { note: null });
    else if (dice < 0.75)
      await post(charge, 'readings', { amps: String(Math.round(Math.abs(charge.amps ?? 8) * 10) / 10) });
    else if (dice < 0.95) await post(charge, 'hold', { reason: 'the bench is needed' });
    else if (dice < 0.97) await post(charge, 'stop', { reason: 'another module came' });
  }

  async function takeAlert(): Promise<void> {
    const open = (await alertsOf(bench)).filter((one) => one.clearedAt === null && one.takenAt === null);
    if (open.length === 0) return;
    const one = open[Math.floor(random() * open.length)]!;
    const answer = await bench.as('technician').post(`/api/alerts/${one.id}/take`).set('Idempotency-Key', key());
    expect(answer.status).toBeLessThan(500);
  }

  /** Exactly when something falls due; the mere refreshes of several charges are taken together. */
  async function nextInstant(): Promise<number> {
    const now = clock.now();
    const [row] = (await deps.dataSource.query(
      `SELECT (SELECT min(next_due_at) FROM charge) AS looked, min(at) AS due FROM (
         SELECT taper_at AS at FROM charge UNION SELECT current_end_at FROM charge UNION SELECT check_due_at FROM charge
         UNION SELECT due_at FROM look_in WHERE done_at IS NULL UNION SELECT pass_due_at FROM alert)
       WHERE at > ${now}`,
    )) as { looked: number | null; due: number | null }[];
    return Math.min(Math.max(row?.looked ?? Infinity, now + 4 * minute), row?.due ?? Infinity);
  }

  /** Whoever is there is given the look-ins that are to come. */
  async function lookInsAreGiven(): Promise<void> {
    const today = (await bench.as('foreman').get('/api/bench-plan').expect(200)).body as BenchPlanDto;
    const now = clock.now();
    for (const { channelName, dueAt, doneAt, person } of today.charges.flatMap(({ lookIns }) => lookIns)) {
      if (doneAt !== null || at(dueAt) <= now || person !== null) continue;
      const free = today.people.filter(
        ({ present, blocks }) =>
          present.some((one) => at(one.from) <= at(dueAt) && at(dueAt) + 5 * minute <= at(one.to)) &&
          !blocks.some((one) => at(one.from) < at(dueAt) + 5 * minute && at(dueAt) < at(one.to)),
      );
      expect(
        free.map((one) => one.person.name),
        `look-in at ${channelName}, ${dueAt}, is nobody's`,
      ).toEqual([]);
    }
  }

  try {
    await peopleCome(bench);
    const end = clock.now() + days * 24 * hour;
    let nextAct = clock.now();
    let nextLook = clock.now();
    let lived = 0;
    let restless = 0;
    for (let last = clock.now(); clock.now() < end; last = clock.now()) {
      clock.set(Math.max(last + 1, Math.min(await nextInstant(), nextAct, last + 30 * minute)));
      lived += clock.now() - last;
      restless = clock.now() - last < 1000 ? restless + 1 : 0;
      expect(restless, 'rounds in a row within a second of each other').toBeLessThan(20);
      await bench.sleeper.runDue();
      await happened('time went on');
      if (jumpsADay > 0 && lived > (24 * hour) / jumpsADay) {
        lived = 0;
        told.jumps += 1;
        const by = random() < 0.5 ? hour : -hour;
        clock.advance(by);
        nextAct = Math.min(nextAct, clock.now() + 15 * minute);
        await bench.sleeper.runDue();
        await happened(`the clock was set ${by > 0 ? 'ahead' : 'back'}`);
      }
      if (clock.now() < nextAct) continue;
      const busy = clockHour(clock.now()) >= 6 && clockHour(clock.now()) < 22;
      nextAct = clock.now() + Math.round((busy ? 4 + 10 * random() : 60 + 60 * random()) * minute);
      const lane = Math.floor(random() * lanes.length);
      await (random() < 0.1 ? takeAlert() : visit(lane));
      await bench.sleeper.runDue();
      await happened(`somebody was at ${lanes[lane]!.channel}`);
      if (clock.now() < nextLook) continue;
      nextLook = clock.now() + 3 * hour;
      await lookInsAreGiven();
    }
    told.transitions = truths.transitions();
    const [count] = (await deps.dataSource.query('SELECT count(*) AS n FROM alert')) as { n: number }[];
    told.alerts = count!.n;
    return told;
  } finally {
    await bench.server.close();
  }
}

/** The workshop is open from six to ten in the evening on every day. */
async function peopleCome(bench: Bench): Promise<void> {
  const manager = bench.as('manager');
  const { rev } = (await manager.get('/api/workshop').expect(200)).body as { rev: number };
  const workingHours = Array.from({ length: 7 }, () => ({ from: '06:00', to: '22:00' }));
  await manager.patch('/api/workshop', { workingHours }).set('If-Match', `"${rev}"`).expect(200);
}
