import type { OddSeen, Reckoning } from '../live-types';
import type { PlanModel } from '../plan/plan-model';
import { twoSidedTail } from '../statistics/normal-cdf';
import { Learns, NOTHING_LEARNED } from './learned';
import { readAxes } from './live-draws';
import { LiveFacts, placesOf } from './live-facts';
import { JUDGES, LIVE_SPREADS, PARTICLES } from './live-spreads';
import type { LivePast } from './live-rounds';
import { isFull, Looks, type Since } from './looks';
import { observationsOf, type Observation } from './observations';
import { oddAmps } from './odd-amps';
import { oddCelsius, type WarmFrom } from './odd-celsius';
import { oddGroup } from './odd-group';
import { offOfVolts, oddVolts } from './odd-volts';
import { OddRuns, type OddLook } from './odd-run';
import { ParticleSet } from './particle-set';
import { rippleOf } from './ripple';
import type { KeptReading } from './thin-readings';

/** What the readings of a charge have made of its samples. */
export interface Followed {
  /** Null where no reading says anything of the module: the plan's own samples stand. */
  set: ParticleSet | null;
  odd: OddSeen | null;
  /** Of the last reading with volts between the clips, before it was taken in: 0…1; null without one. */
  chance: number | null;
  /** Charge that had moved when the voltage was last taken in, as a share of the capacity. */
  lookedAtSoc: number | null;
  learned: Reckoning['learned'];
  /** Of the readings under current alone: at rest they say nothing any more of when the current ended. */
  learnedUnderCurrent: Reckoning['learned'];
}

/**
 * Takes the readings in one after the other, in order of time: each is first judged by the samples that the ones before have
 * left, and if it is not odd they are reweighted by it. A reading that is odd teaches nothing.
 */
export function followReadings(model: PlanModel, past: LivePast, kept: readonly KeptReading[], seed: number): Followed {
  const followed: Followed = {
    set: null,
    odd: null,
    chance: null,
    lookedAtSoc: null,
    learned: NOTHING_LEARNED,
    learnedUnderCurrent: NOTHING_LEARNED,
  };
  if (kept.length === 0 || model.sampleCount === 1) return followed;
  const observations = observationsOf(model, past, kept);
  const facts = new LiveFacts(model, placesOf(model, observations));
  const set = new ParticleSet(facts, readAxes(model), JUDGES, seed);
  const looks = new Looks(model, facts, rippleOf(observations));
  const learns = new Learns(model, past, set);
  const runs = new OddRuns();
  let underCurrent: Reckoning['learned'] | null = null;
  let voltsSoc: number | null = null;
  let celsiusS: number | null = null;
  let warmFrom: WarmFrom | null = null;
  for (const at of observations) {
    const { circuit, kept: reading } = at;
    if (at.atRest) underCurrent ??= learns.now();
    const soc = movedSoc(model, at);
    const along = voltsSoc === null ? 0 : Math.abs(soc - voltsSoc) / LIVE_SPREADS.modelCorrelationSoc;
    const since: Since = {
      keptVolts: Math.exp(-along),
      // A smooth error forgets itself over the same charge with equal integrals of the two correlations.
      smoothVolts: Math.exp((-Math.PI / 4) * along ** 2),
      keptCelsius: celsiusS === null ? 1 : Math.exp(-(reading.s - celsiusS) / LIVE_SPREADS.celsiusDriftS),
    };
    const odd: (OddLook | null)[] = [];
    const judge = (quantity: OddSeen['quantity'], read: boolean, found: OddLook | null): void => {
      if (read) runs.note(quantity, found, reading.s, reading.count);
      odd.push(found);
    };
    const { amps, terminalVolts, groupVolts, celsius } = reading.reading;
    const terminal = circuit ? looks.terminal(at, circuit, since) : null;
    const off = circuit && terminal ? offOfVolts(set, looks, terminal, at, circuit) : null;
    if (off) followed.chance = twoSidedTail(off.level);
    if (circuit) {
      const current = oddAmps(set, looks, at, circuit);
      const asked = off !== null && (current === null || terminalVolts !== null);
      const volts = asked ? oddVolts(set, terminal!, off, at, circuit) : null;
      const byAmps = volts?.quantity === 'amps' ? volts : null;
      judge('amps', amps !== null, current ?? byAmps);
      judge('terminal-volts', terminalVolts !== null, byAmps ? null : volts);
      judge('group-volts', groupVolts !== null, oddGroup(model, at));
    } else if (amps !== null) runs.note('amps', null, reading.s, reading.count);
    judge('celsius', celsius !== null, oddCelsius(model, set, at, warmFrom));
    if (odd.some((one) => one !== null)) continue;
    if (celsius !== null) {
      warmFrom ??= { s: reading.s, celsius, ownHeatKelvin: at.ownHeatKelvin };
      celsiusS = reading.s;
    }
    if (takeIn(set, looks, at, since, terminal)) voltsSoc = soc;
  }
  set.settle(Math.max(PARTICLES, model.sampleCount));
  return {
    ...followed,
    set: set.read ? set : null,
    odd: runs.current(),
    lookedAtSoc: voltsSoc,
    learned: learns.now(),
    learnedUnderCurrent: underCurrent ?? learns.now(),
  };
}

/** @returns whether a voltage under current was taken in */
function takeIn(
  set: ParticleSet,
  looks: Looks,
  at: Observation,
  since: Since,
  terminal: ReturnType<Looks['terminal']>,
): boolean {
  let volts = false;
  if (at.circuit) {
    const amps = looks.amps(at);
    if (amps && at.kept.amps !== null && isFull(at.circuit, at.kept.amps)) set.take(amps);
    if (terminal) {
      set.take(terminal);
      volts = true;
    }
  }
  const mean = looks.groupMean(at, volts ? { ...since, keptVolts: 1 } : since);
  if (mean) {
    set.take(mean);
    volts ||= mean.memory === 'volts';
  }
  const celsius = looks.celsius(at, since);
  if (celsius) set.take(celsius);
  return volts;
}

/** Charge moved so far as a share of the capacity, mean of the groups. */
function movedSoc(model: PlanModel, { movedAh }: Observation): number {
  const sum = movedAh.reduce(
    (total, ampHours, group) => total + Math.abs(ampHours) / model.groups[group]!.capacityAh,
    0,
  );
  return sum / movedAh.length;
}
