import { expect, test } from 'vitest';
import { seededRandom } from '@/calc/index';
import { ChannelHold } from '@/server/entities/channel-hold';
import { Charge } from '@/server/entities/charge';
import { RunStretch } from '@/server/entities/run-stretch';
import type { ChargeDto, Stage } from '@/shared/contract/charge';
import { act, alertsOf, answered, at, boardOf, hour, kept, makeBench, minute, seen, type Bench } from './bench';

const flowing: Stage[] = ['charging', 'discharging', 'tapering'];

/** What must be true of a workshop at any moment, whatever was done before. */
async function invariants(bench: Bench, told: string): Promise<void> {
  const { manager } = bench.server.deps.dataSource;
  const holds = await manager.findBy(ChannelHold, { state: 'running' });
  expect(new Set(holds.map((hold) => hold.channelId)).size, `${told}: one charge a channel`).toBe(holds.length);
  const now = bench.server.clock.now();
  for (const row of await manager.find(Charge)) {
    const open = await manager.findBy(RunStretch, { chargeId: row.id });
    const stretches = open.sort((one, other) => one.fromAt - other.fromAt);
    expect(stretches.filter((run) => run.toAt === null).length, `${told}: at most one open stretch`).toBeLessThan(2);
    for (const [index, run] of stretches.entries()) {
      if (run.toAt !== null)
        expect(run.toAt, `${told}: a stretch ends after it begins`).toBeGreaterThanOrEqual(run.fromAt);
      const next = stretches[index + 1];
      if (next)
        expect(next.fromAt, `${told}: stretches follow one another`).toBeGreaterThanOrEqual(run.toAt ?? Infinity);
    }
    const held = holds.some((hold) => hold.chargeId === row.id);
    const needs = row.option.steps.some((step) => step.channelIds.length > 0);
    if (row.stage === 'held' && needs) expect(held, `${told}: a held charge keeps its channel`).toBe(true);
    if (!flowing.includes(row.stage) && row.stage !== 'held')
      expect(held, `${told}: ${row.stage} holds none`).toBe(false);
    if (row.nextDueAt !== null && row.stage !== 'held')
      expect(row.nextDueAt, `${told}: due lies ahead of ${row.stage}`).toBeGreaterThan(now - 1);
    if (flowing.includes(row.stage)) expect(row.nextDueAt, `${told}: what runs is looked at again`).not.toBeNull();
  }
  const board = await boardOf(bench);
  for (const card of board.charges) {
    if (card.ready === null) continue;
    expect(at(card.ready.early), `${told}: band of ${card.stage}`).toBeLessThanOrEqual(at(card.ready.likely) + 1);
    expect(at(card.ready.likely), `${told}: band of ${card.stage}`).toBeLessThanOrEqual(at(card.ready.late) + 1);
    for (const [index, segment] of card.segments.entries()) {
      expect(at(segment.to)).toBeGreaterThanOrEqual(at(segment.from));
      if (index > 0) expect(at(segment.from)).toBeGreaterThanOrEqual(at(card.segments[index - 1]!.to) - 1500);
    }
  }
  const alerts = await alertsOf(bench);
  const openOnes = alerts.filter((alert) => alert.clearedAt === null).map((alert) => `${alert.kind} ${alert.chargeId}`);
  expect(new Set(openOnes).size, `${told}: one open alert a kind and charge`).toBe(openOnes.length);
  const byId = new Map(board.charges.map((card) => [card.id, card]));
  for (const alert of alerts.filter((one) => one.clearedAt === null)) {
    const stage = byId.get(alert.chargeId ?? '')?.stage;
    if (alert.kind === 'check-due') expect(stage, told).toBe('check-due');
    if (alert.kind === 'step-swap') expect(flowing, told).toContain(stage);
    if (alert.kind === 'charge-done') expect(['resting', 'check-due'], told).toContain(stage);
  }
}

test.each([1, 2, 3])(
  'of 70 random acts (seed %i) none ends in a fault, and the bench stays whole after each',
  async (seed) => {
    const random = seededRandom(seed);
    const pick = <T>(list: readonly T[]): T => list[Math.floor(random() * list.length)]!;
    const bench = await makeBench();
    const lanes = [
      { channel: 'A1' },
      { channel: 'B1', finish: 'on-the-mark' as const },
      { channel: 'C1', way: 'group-by-group' as const },
    ];
    const ids: string[] = [];
    let spares = 0;
    const begin = async (lane: number): Promise<void> => {
      const spareId = await bench.spare(`S-${(spares += 1)}`, [3.802, 3.802 + (lane === 2 ? 0.03 : 0.004) * random()]);
      ids[lane] = (await answered(bench, await kept(bench, { spareId }, lanes[lane]))).id;
    };
    const post = async (charge: ChargeDto, what: string, body: object = {}): Promise<string> => {
      const answer = await act(bench, charge, what, body, pick(['technician', 'foreman'] as const));
      expect(answer.status, `${what}: ${JSON.stringify(answer.body).slice(0, 500)}`).toBeLessThan(500);
      return `${what} at ${charge.stage}: ${answer.status}`;
    };
    const correct = async (charge: ChargeDto): Promise<string> => {
      const reading = charge.readings.length === 0 ? null : pick(charge.readings);
      if (!reading) return 'nothing to correct';
      const amps = String(Math.round(100 * random()) / 10);
      const answer = await bench.as('foreman').patch(`/api/charges/${charge.id}/readings/${reading.id}`, { amps });
      expect(answer.status).toBeLessThan(500);
      return `correct at ${charge.stage}: ${answer.status}`;
    };
    try {
      for (const lane of lanes.keys()) await begin(lane);
      for (let step = 0; step < 70; step += 1) {
        const lane = Math.floor(random() * lanes.length);
        const charge = await seen(bench, ids[lane]!);
        const earlier = new Date(bench.server.clock.now() - random() * 20 * minute).toISOString();
        const when = random() < 0.3 ? { at: earlier } : {};
        const volts = () => [3.949 + 0.012 * (random() - 0.5), 3.949 + 0.012 * (random() - 0.5)];
        const amps = () => String(Math.round(Math.abs(charge.amps ?? 8) * (0.6 + 0.6 * random()) * 10) / 10);
        const acts = {
          start: () => post(charge, 'start', when),
          hold: () => post(charge, 'hold', { reason: 'look', ...when }),
          resume: () => post(charge, 'resume', when),
          next: () => post(charge, 'next-step', when),
          off: () => post(charge, 'current-off', when),
          check: () => post(charge, 'rest-check', { groupVolts: volts(), celsius: 21, meterId: null, ...when }),
          look: () => post(charge, 'look-ins'),
          give: () => post(charge, 'hand-over', { personId: pick(['own-foreman', 'own-technician']) }),
          read: () => post(charge, 'readings', { amps: amps(), ...when }),
          zero: () => post(charge, 'readings', { amps: '0', ...when }),
          volts: () => post(charge, 'readings', { groupVolts: volts(), celsius: '23', ...when }),
          correct: () => correct(charge),
          stop: () => post(charge, 'stop', { reason: 'done with it', ...when }),
          fit: () => post(charge, 'fit'),
          shelve: () => post(charge, 'shelve', { shelfPlace: 'D1' }),
          leap: async () => {
            await bench.pass(random() * hour);
            return 'time leaps';
          },
          wait: async () => {
            await bench.live(random() * hour, 10 * minute);
            return 'time passes';
          },
        };
        const sensible: Record<string, (keyof typeof acts)[]> = {
          planned: ['start'],
          held: ['resume', 'resume', 'leap', 'volts', 'stop'],
          resting: ['off', 'wait', 'leap', 'read', 'volts', 'check', 'correct'],
          'check-due': ['check', 'check', 'off', 'leap', 'shelve'],
          ready: ['fit', 'shelve', 'leap'],
        };
        const run: (keyof typeof acts)[] = [
          'hold',
          'next',
          'off',
          'read',
          'read',
          'zero',
          'look',
          'leap',
          'wait',
          'wait',
          'correct',
        ];
        const name =
          random() < 0.8 ? pick(sensible[charge.stage] ?? run) : pick(Object.keys(acts) as (keyof typeof acts)[]);
        const told = await acts[name]();
        await bench.sleeper.runDue();
        await invariants(bench, `seed ${seed}, step ${step}, ${told}`);
        if (['stopped', 'fitted', 'shelved'].includes((await seen(bench, ids[lane]!)).stage)) await begin(lane);
      }
    } finally {
      await bench.server.close();
    }
  },
  300_000,
);
