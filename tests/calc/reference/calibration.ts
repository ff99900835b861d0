import { planCharge, reckonCharge } from '@/calc/index';
import type { PlanInput, PlanOption } from '@/calc/plan-types';
import { reckonInput } from '../live-fixtures';
import { channel, lmoModule, lmoSpare, planInput, target } from '../plan-fixtures';
import { spreadsOf } from './world-spreads';
import { Chance, drawWorld, type Twist, type World } from './worlds';

/** Charges that worlds are drawn for, all through the terminals; every other one on the mark. */
const makeCharges = (): { plan: PlanInput; option: PlanOption }[] => {
  const charger = { offsetSdVolts: 0.004, displayStepVolts: 0.01 };
  const plans = [
    planInput({ channels: [channel('A1', charger)] }),
    planInput({
      channels: [
        channel('A2', {
          ...charger,
          senses: 'own-terminals',
          leadResistanceOhm: 0.002,
          leadsMeasured: false,
          maxAmps: 8,
        }),
      ],
      module: { ...lmoModule, chemistry: 'nmc', ratedAh: 52, resistanceKind: 'pulse-10s', resistanceOhm: 0.001 },
      spare: { ...lmoSpare, groupVolts: [3.62, 3.62], capacityAh: 52, capacitySource: 'label', meterId: 'm2' },
      target: { ...target, volts: 3.8 },
    }),
  ];
  return plans.flatMap((plan) =>
    (['over-and-settle', 'on-the-mark'] as const).flatMap((finish) =>
      [1, 2, 3, 4, 5, 6, 7, 8].map((seed) => {
        const seeded = { ...plan, seed };
        const option = planCharge(seeded).options.find((one) => one.way === 'terminals' && one.finish === finish)!;
        return { plan: seeded, option };
      }),
    ),
  );
};

let made: ReturnType<typeof makeCharges> | null = null;
/** The charges, planned when they are first asked for. */
export const charges = (): ReturnType<typeof makeCharges> => (made ??= makeCharges());

/**
 * Worlds that are not what the code was told. The second time constant takes a fifth of the long resistance: a 30.5 Ah cell of
 * the LMO blend charged at 15.3 A to 4.2 V then has a taper whose time constant grows 3.2 times from the first halving to the
 * last, 2.4 times with one; a measured one grows twice (313 to 627 s, sources of the design).
 */
export const TWISTS: Record<string, (chance: Chance) => Twist> = {
  /** The plan's spreads and the meters'. The model's own error under current is a reserve: see 'curve bent'. */
  'as stated': () => ({}),
  'two time constants': () => ({ slow: { share: 0.2, tauS: 1500 } }),
  'curve off by 10 mV': (chance) => ({ curveVolts: chance.uniform() < 0.5 ? 0.01 : -0.01 }),
  /** Beyond what was asked for: humps of the curve, as far as the model says that it may be off under current. */
  'curve bent': () => ({ bent: true }),
  'leads unknown': (chance) => ({ leadOhm: 0.001 + 0.007 * chance.uniform() }),
};

export const SHARES = [0, 0.25, 0.5, 0.75] as const;

export interface Held {
  share: number;
  inside: number;
  below: number;
  above: number;
  count: number;
  /** Mean width of the band, s. */
  widthS: number;
}

/**
 * How many of `count` charges end inside the band of the plan, and inside that of the reckoning with readings every
 * `everyS` after a quarter, half and three quarters of the true time of current.
 */
export function calibrate(seed: number, count: number, twist: string, everyS = 900): Held[] {
  const chance = new Chance(seed);
  const held = SHARES.map((share): Held => ({ share, inside: 0, below: 0, above: 0, count: 0, widthS: 0 }));
  const used =
    twist === 'leads unknown' ? charges().filter(({ plan }) => plan.channels[0]!.senses !== 'module') : charges();
  for (let at = 0; at < count; at += 1) {
    const { plan, option } = used[(at * 13) % used.length]!;
    const world = drawWorld(plan, option, spreadsOf(plan), chance, TWISTS[twist]!(chance));
    if (world === null) throw new Error(`a world of ${option.id} never ends`);
    // Readings have a source of their own, so that the worlds stay the same whatever is read in them.
    tally(held, plan, option, world, new Chance(1e6 * seed + at), everyS);
  }
  for (const one of held) one.widthS /= one.count;
  return held;
}

function tally(held: Held[], plan: PlanInput, option: PlanOption, world: World, chance: Chance, everyS: number): void {
  const fixedS = option.restS + plan.workshop.checkS;
  const times = Array.from({ length: Math.floor(world.currentS / everyS) }, (_, k) => (k + 1) * everyS);
  const readings = world.readAt(times, chance);
  const clipOnS = option.currentStartS;
  for (const one of held) {
    const nowS = one.share * world.currentS;
    const { totalS } = option;
    const { p10, p90 } =
      one.share === 0
        ? { p10: totalS.p10 - clipOnS, p90: totalS.p90 - clipOnS }
        : reckonCharge(reckonInput(plan, option, { nowS, readings: readings.filter(({ s }) => s <= nowS) })).readyS;
    const truth = world.currentS + fixedS;
    one.count += 1;
    one.widthS += p90 - p10;
    if (truth < p10) one.below += 1;
    else if (truth > p90) one.above += 1;
    else one.inside += 1;
  }
}

export const pooled = (runs: Held[][]): Held[] =>
  SHARES.map((share, at) => {
    const all = runs.map((run) => run[at]!);
    const sum = (of: (one: Held) => number): number => all.reduce((total, one) => total + of(one), 0);
    const count = sum((one) => one.count);
    return {
      share,
      inside: sum((one) => one.inside),
      below: sum((one) => one.below),
      above: sum((one) => one.above),
      count,
      widthS: sum((one) => one.widthS * one.count) / count,
    };
  });

/** @param stated the same moments in worlds as stated, for the ratio of the widths */
export const heldText = (twist: string, held: Held[], stated?: Held[]): string[] =>
  held.map(({ share, inside, below, above, count, widthS }, at) => {
    const percent = (part: number): string => `${((100 * part) / count).toFixed(1)} %`;
    const when = share === 0 ? 'before the charge' : `after ${share * 100} % of it`;
    const ratio = stated ? ` (${(widthS / stated[at]!.widthS).toFixed(2)} times as stated)` : '';
    return `  ${twist}, ${when}: ${percent(inside)} inside (${percent(below)} sooner, ${percent(above)} later), width ${(widthS / 60).toFixed(1)} min${ratio}, ${count} charges`;
  });
