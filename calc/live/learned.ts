import type { Learned, Reckoning } from '../live-types';
import type { PlanModel } from '../plan/plan-model';
import { leadSlopes, slopesOf } from './live-facts';
import type { LivePast } from './live-rounds';
import type { ParticleSet } from './particle-set';
import { mean } from '../statistics/mean';

/** Learned is what has lost at least this share of its variance: less is no news, and in a set of this size partly chance. */
const LEARNED_SHARE = 0.2;

export const NOTHING_LEARNED: Reckoning['learned'] = { capacityAh: null, longOhm: null, leadOhm: null };

/** What the samples of a charge say of its module and leads, before the readings and after. */
export class Learns {
  private readonly numbers: Record<keyof Reckoning['learned'], readonly number[] | null>;
  private readonly prior: Record<keyof Reckoning['learned'], { mean: number; variance: number } | null>;

  /** @param set not read yet */
  constructor(
    model: PlanModel,
    past: LivePast,
    private readonly set: ParticleSet,
  ) {
    const round = past.begun[past.begun.length - 1];
    const step = round?.lanes.length === 1 ? round.lanes[0]!.step : null;
    const channel = model.input.channels.find((one) => one.channelId === step?.channelIds[0]);
    this.numbers = {
      capacityAh: slopesOf({ capacity: mean(model.basis.capacityAh) }),
      longOhm: slopesOf({ resistance: mean(model.nominal.longOhm) }),
      leadOhm: channel ? slopesOf(leadSlopes(channel)) : null,
    };
    this.prior = {
      capacityAh: this.moments('capacityAh'),
      longOhm: this.moments('longOhm'),
      leadOhm: this.moments('leadOhm'),
    };
  }

  private moments(name: keyof Reckoning['learned']): { mean: number; variance: number } | null {
    const of = this.numbers[name];
    return of && this.set.moments(of);
  }

  now(): Reckoning['learned'] {
    return { capacityAh: this.one('capacityAh'), longOhm: this.one('longOhm'), leadOhm: this.one('leadOhm') };
  }

  private one(name: keyof Reckoning['learned']): Learned | null {
    const prior = this.prior[name];
    const now = this.moments(name);
    if (!prior || !now || !this.set.read || !(now.variance < (1 - LEARNED_SHARE) * prior.variance)) return null;
    return {
      mean: now.mean,
      sd: Math.sqrt(now.variance),
      priorMean: prior.mean,
      priorSd: Math.sqrt(prior.variance),
    };
  }
}
