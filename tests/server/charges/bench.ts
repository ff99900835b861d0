/**
 * A bench for the tests of charges: one type, channels, a meter, spares, and the steps of a person's day by the API.
 *
 * The type is two groups of 66 Ah on the measured LMO-blend table (batterysim/equiv-circ-model, MIT): rest voltages that
 * lie on its points have charges known without any interpolation: 3.802 V is 26.97 %, 3.949 V is 58.26 %.
 */
import { expect } from 'vitest';
import { makeSleeper, type SleeperLoop } from '@/server/live/sleeper-loop';
import type { AlertDto } from '@/shared/contract/alert';
import type { BoardDto } from '@/shared/contract/board';
import type { ChargeDto } from '@/shared/contract/charge';
import type { PlanDto, PlanOption } from '@/shared/contract/plan';
import type { Role } from '@/shared/contract/roles';
import { makeTestServer, type TestAgent, type TestServer, type TestServerOptions } from '@/tests/support/server';

export const minute = 60_000;
export const hour = 3_600_000;

/** Points of the published table: V and state of charge. */
export const low = { volts: 3.802, soc: 0.2697 };
export const high = { volts: 3.949, soc: 0.5826 };
/** Measured capacity of a group of every spare here, Ah. */
export const capacityAh = 60;

export interface Bench {
  server: TestServer;
  sleeper: SleeperLoop;
  as: (role: Role) => TestAgent;
  typeId: string;
  meterId: string;
  channels: Record<string, string>;
  spare(label: string, groupVolts?: number[], more?: { celsius?: number | null; condition?: string }): Promise<string>;
  /** Moves the clock on and lets the sleeper do what is due. */
  pass(ms: number): Promise<void>;
  /** As `pass`, in steps, as a server that is never asked would live through it. */
  live(ms: number, stepMs?: number): Promise<void>;
}

let keys = 0;
export const key = (): string => `test-key-${(keys += 1)}-abcdefgh`;

interface ChannelChange {
  name: string;
  maxAmps?: number;
  singleGroup?: boolean;
  canDischarge?: boolean;
  dischargeAmps?: number | null;
}
const channel = (change: ChannelChange) => ({
  maxAmps: 10,
  minAmps: 0.01,
  maxVolts: 60,
  maxWatts: null,
  adjustableVolts: true,
  senses: 'module',
  leadMilliohm: 0,
  displayStepMillivolts: 10,
  singleGroup: false,
  canDischarge: false,
  dischargeAmps: null,
  loadOhm: null,
  ...change,
});

const defaultChannels: ChannelChange[] = [
  { name: 'A1' },
  { name: 'B1', maxAmps: 20 },
  { name: 'C1', maxAmps: 10, singleGroup: true, canDischarge: true, dischargeAmps: 10 },
];

export async function makeBench(
  options: TestServerOptions & { channels?: ChannelChange[]; groups?: number } = {},
): Promise<Bench> {
  const server = await makeTestServer(options);
  const sleeper = makeSleeper(server.deps);
  server.deps.sleeper = sleeper;
  const manager = server.agentFor('manager');
  const type = await manager
    .post('/api/module-types', {
      name: '2-series 66 Ah',
      chemistry: 'lmo-blend',
      groupsInSeries: options.groups ?? 2,
      cellsInParallel: 2,
      ratedAh: 66,
      chargeLimitVolts: 4.2,
      dischargeLimitVolts: 3,
      floorVolts: 2.5,
      maxChargeAmps: 60,
      maxDischargeAmps: 60,
      minChargeCelsius: 10,
      maxChargeCelsius: 45,
      resistanceMilliohm: 2,
      resistanceKind: 'long',
      linkMilliohm: 0,
      shelfVolts: 3.8,
      selfDischargePercentPerMonth: 0,
      note: null,
    })
    .expect((answer) => expect(answer.body, JSON.stringify(answer.body)).toHaveProperty('id'));
  const charger = await manager
    .post('/api/chargers', {
      name: 'Bench charger',
      place: 'bench 2',
      meterId: null,
      channels: (options.channels ?? defaultChannels).map(channel),
    })
    .expect((answer) => expect(answer.body, JSON.stringify(answer.body)).toHaveProperty('id'));
  const meter = await manager.post('/api/meters', { name: 'bench 2', offsetMillivolts: 0, checkedAt: null });
  const channels = Object.fromEntries(
    (charger.body as { channels: { id: string; name: string }[] }).channels.map(({ id, name }) => [name, id]),
  );
  const typeId = (type.body as { id: string }).id;
  const meterId = (meter.body as { id: string }).id;
  const bench: Bench = {
    server,
    sleeper,
    as: (role) => server.agentFor(role),
    typeId,
    meterId,
    channels,
    async spare(label, groupVolts, more = {}) {
      const volts = groupVolts ?? Array.from({ length: options.groups ?? 2 }, () => low.volts);
      const answer = await server.agentFor('technician').post('/api/spares', {
        label,
        moduleTypeId: typeId,
        shelfPlace: 'D3',
        capacityAh,
        healthPercent: null,
        capacitySource: 'measured',
        condition: more.condition ?? 'sound',
        note: null,
        reading: {
          groupVolts: volts,
          celsius: more.celsius === undefined ? 21 : more.celsius,
          meterId,
          at: new Date(server.clock.now()).toISOString(),
        },
      });
      expect(answer.body, JSON.stringify(answer.body)).toHaveProperty('id');
      return (answer.body as { id: string }).id;
    },
    async pass(ms) {
      server.clock.advance(ms);
      await sleeper.runDue();
    },
    async live(ms, stepMs = minute) {
      const end = server.clock.now() + ms;
      while (server.clock.now() < end) {
        server.clock.advance(Math.min(stepMs, end - server.clock.now()));
        await sleeper.runDue();
      }
    },
  };
  return bench;
}

export interface Wish {
  spareId: string;
  targetVolts?: number;
  meterId?: string | null;
  toleranceMillivolts?: number | null;
  readyBy?: string | null;
  clipOnAt?: string | null;
  repairRef?: string | null;
  topUpOf?: string;
}
export const wishOf = (bench: Bench, wish: Wish) => ({
  targetVolts: high.volts,
  toleranceMillivolts: 5,
  meterId: bench.meterId,
  packCelsius: 21,
  readyBy: null,
  clipOnAt: null,
  repairRef: null,
  modulePosition: null,
  ...wish,
});

/** The option of a plan that a test means. */
export interface Meant {
  way?: PlanOption['way'];
  finish?: PlanOption['finish'];
  channel?: string;
}
export async function planned(bench: Bench, wish: Wish, meant: Meant = {}): Promise<PlanOption> {
  const answer = await bench.as('technician').post('/api/plans', wishOf(bench, wish));
  const { plan } = answer.body as PlanDto;
  const option = plan?.options.find(
    (one) =>
      one.way === (meant.way ?? 'terminals') &&
      one.finish === (meant.finish ?? 'over-and-settle') &&
      one.channelIds[0] === bench.channels[meant.channel ?? 'A1'],
  );
  expect(option, JSON.stringify(plan ?? answer.body).slice(0, 3000)).toBeDefined();
  return option!;
}

/** Keeps a plan as a charge. */
export async function kept(bench: Bench, wish: Wish, meant: Meant = {}, role: Role = 'technician'): Promise<ChargeDto> {
  const option = await planned(bench, wish, meant);
  bench.server.clock.advance(1);
  const answer = await bench
    .as(role)
    .post('/api/charges', { ...wishOf(bench, wish), optionId: option.id })
    .set('Idempotency-Key', key());
  expect(answer.status, JSON.stringify(answer.body)).toBe(201);
  return answer.body as ChargeDto;
}

/**
 * Gives every charge the same sample set. Its seed belongs to the spare and its reading, which have other ids in every
 * test; where two charges are compared to the second, their bands must not differ by the draw.
 */
export const sameSamples = (bench: Bench): Promise<unknown> =>
  bench.server.deps.dataSource.query(`UPDATE charge SET frozen = json_set(frozen, '$.seed', 7)`);

/** Answers with yes what a person has to answer. */
export async function answered(bench: Bench, charge: ChargeDto, role: Role = 'technician'): Promise<ChargeDto> {
  let present = charge;
  for (const item of charge.checks) {
    if (item.by !== 'person') continue;
    const answer = await bench
      .as(role)
      .post(`/api/charges/${charge.id}/checks`, { code: item.code, answer: 'yes' })
      .set('Idempotency-Key', key());
    expect(answer.status, JSON.stringify(answer.body)).toBe(200);
    present = answer.body as ChargeDto;
  }
  return present;
}

/** An act on a charge with its revision and a key of its own. */
export const act = (
  bench: Bench,
  charge: Pick<ChargeDto, 'id' | 'rev'>,
  what: string,
  body: object = {},
  role: Role = 'technician',
) => {
  // No two acts of a person happen at the same millisecond.
  bench.server.clock.advance(1);
  return bench
    .as(role)
    .post(`/api/charges/${charge.id}/${what}`, body)
    .set('If-Match', `"${charge.rev}"`)
    .set('Idempotency-Key', key());
};

/** The same, expected to be taken. */
export async function did(
  bench: Bench,
  charge: Pick<ChargeDto, 'id' | 'rev'>,
  what: string,
  body: object = {},
  role: Role = 'technician',
): Promise<ChargeDto> {
  const answer = await act(bench, charge, what, body, role);
  expect(answer.status, `${what}: ${JSON.stringify(answer.body)}`).toBe(200);
  return answer.body as ChargeDto;
}

/** A charge that runs: kept, every check answered, clipped on. */
export async function running(bench: Bench, wish: Wish, meant: Meant = {}): Promise<ChargeDto> {
  return did(bench, await answered(bench, await kept(bench, wish, meant)), 'start');
}

export async function seen(bench: Bench, id: string): Promise<ChargeDto> {
  const answer = await bench.as('technician').get(`/api/charges/${id}`);
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  return answer.body as ChargeDto;
}
export const boardOf = async (bench: Bench): Promise<BoardDto> =>
  (await bench.as('technician').get('/api/board').expect(200)).body as BoardDto;
export const alertsOf = async (bench: Bench): Promise<AlertDto[]> =>
  (await bench.as('technician').get('/api/alerts').expect(200)).body as AlertDto[];

export const at = (iso: string | null): number => Date.parse(iso ?? '');
