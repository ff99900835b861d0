/** Eight weeks of charges that are over, made by running the model with seeded noise. */
import type { DateTime } from 'luxon';
import { askedOn, workingDays, type AskedCharge } from './past-calendar';
import { planPast, runPast, type PastPlan, type PastRun, type PastShop, type PastWish } from './past-plan';
import { makeNoise, shown, type Noise } from './noise';

const MINUTE = 60_000;
const SEED = 20_260_413;
/** A channel is free again this long after the current: the clips are taken off and put on. */
const CHANGE_MS = 8 * MINUTE;

export type PastEnd = 'fitted' | 'outside' | 'stopped';

export interface PastCharge {
  key: string;
  /** Place of its repair among all repairs, and of its spare among all spares; a second charge has those of the first. */
  repair: number;
  asked: AskedCharge;
  wish: PastWish;
  plan: PastPlan;
  run: PastRun;
  startedAt: number;
  /** End of current; of a stopped one when it was stopped. */
  currentEndAt: number;
  checkDueAt: number;
  /** When its groups were read after the rest; null: it was stopped. */
  checkedAt: number | null;
  checkVolts: number[];
  end: PastEnd;
  topUpOf: string | null;
}

interface Maker {
  shop: PastShop;
  noise: Noise;
  freeAt: Map<string, number>;
  made: PastCharge[];
}

export function makePast(shop: PastShop, now: number): PastCharge[] {
  const maker: Maker = { shop, noise: makeNoise(SEED), freeAt: new Map(), made: [] };
  let repair = 0;
  for (const day of workingDays(now, shop.workshop.zone)) {
    const closing = day.set({ hour: 18, minute: 0 });
    for (const asked of askedOn(day, maker.noise)) {
      const first = makeCharge(maker, asked, closing, repair, null);
      if (first === null) continue;
      goOn(maker, first, closing);
      repair += 1;
    }
  }
  return maker.made.sort((one, other) => one.asked.askedAt - other.asked.askedAt);
}

/** What follows a charge that did not end with a fit: a top-up at once, or the same again after a stop. */
function goOn(maker: Maker, first: PastCharge, closing: DateTime): void {
  const { noise } = maker;
  if (first.end === 'fitted') return;
  const from = first.checkedAt ?? first.currentEndAt + Math.round(noise.between(40, 90)) * MINUTE;
  const again: AskedCharge = {
    ...first.asked,
    askedAt: from + 4 * MINUTE,
    groupVolts: first.checkVolts,
    ways: [
      { way: 'terminals', finish: 'over-and-settle', channel: first.wish.channel === 'C1' ? 'B1' : first.wish.channel },
    ],
  };
  makeCharge(maker, again, closing, first.repair, first.end === 'outside' ? first.key : null, 'fitted');
}

function makeCharge(
  maker: Maker,
  asked: AskedCharge,
  closing: DateTime,
  repair: number,
  topUpOf: string | null,
  wished?: PastEnd,
): PastCharge | null {
  const { shop, noise, freeAt, made } = maker;
  const readyToClip = asked.askedAt + Math.round(noise.between(9, 24)) * MINUTE;
  const begin = (channel: string): number => Math.max(readyToClip, (freeAt.get(channel) ?? 0) + CHANGE_MS);
  const ways = [...asked.ways].sort((one, other) => waited(begin(one.channel)) - waited(begin(other.channel)));
  for (const way of ways) {
    const wish: PastWish = {
      ...way,
      type: asked.type,
      groupVolts: asked.groupVolts,
      capacityAh: asked.capacityAh,
      targetVolts: asked.target,
      askedAt: asked.askedAt,
      readingAgeS: Math.round(noise.between(0.02, wished ? 0.02 : 12) * 86_400),
      seed: made.length + 1,
    };
    const startedAt = begin(way.channel);
    const plan = planPast(shop, wish);
    const run = plan === null ? null : runPast(plan, wish, noise);
    if (plan === null || run === null || startedAt + run.currentS * 1000 > closing.toMillis()) continue;
    const charge = lived(maker, { asked, wish, plan, run, startedAt, repair, topUpOf }, closing, wished);
    made.push(charge);
    freeAt.set(way.channel, charge.currentEndAt);
    return charge;
  }
  return null;

  /** Half an hour more of waiting is nothing against the preferred channel. */
  function waited(at: number): number {
    return Math.floor((at - readyToClip) / (30 * MINUTE));
  }
}

function lived(
  { noise, made }: Maker,
  begun: Pick<PastCharge, 'asked' | 'wish' | 'plan' | 'run' | 'startedAt' | 'repair' | 'topUpOf'>,
  closing: DateTime,
  wished?: PastEnd,
): PastCharge {
  const drawn = noise.share();
  const end: PastEnd = wished ?? (drawn < 0.025 ? 'stopped' : drawn < 0.075 ? 'outside' : 'fitted');
  const { wish, plan, run, startedAt } = begun;
  const share = end === 'stopped' ? noise.between(0.3, 0.7) : 1;
  const currentEndAt = startedAt + Math.round(run.currentS * share * 1000);
  const checkDueAt = currentEndAt + Math.round(plan.option.restS * 1000);
  const target = wish.targetVolts;
  // Short by what a module holds more than was thought.
  const short = end === 'outside' ? noise.between(0.008, 0.014) : 0;
  const along = (volts: number): number => volts + share * (target - volts);
  const checkVolts = wish.groupVolts.map((volts) =>
    end === 'stopped' ? shown(along(volts), 3) : shown(target - short + 0.0013 * noise.normal(), 3),
  );
  return {
    ...begun,
    key: `demo-past-${made.length + 1}`,
    end,
    currentEndAt,
    checkDueAt,
    checkedAt: end === 'stopped' ? null : checkedAt(checkDueAt, closing, noise),
    checkVolts,
  };
}

/** Most checks are made within minutes; what falls due after closing waits for the morning. */
function checkedAt(dueAt: number, closing: DateTime, noise: Noise): number {
  if (dueAt > closing.toMillis()) {
    const morning = closing.plus({ days: closing.weekday === 5 ? 3 : 1 }).set({ hour: 7, minute: 40 });
    return morning.toMillis() + Math.round(noise.between(0, 25)) * MINUTE;
  }
  const minutes = noise.chance(0.1) ? noise.between(12, 80) : noise.between(2.5, 7);
  return dueAt + Math.round(minutes * MINUTE);
}
