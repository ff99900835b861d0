import { describe, expect, it } from 'vitest';
import { chargeThroughTerminals, planCharge, reckonCharge, voltsAtSoc } from '@/calc/index';
import type { LiveReading } from '@/calc/live-types';
import { planModel } from '@/calc/plan/plan-model';
import { reckonInput } from './live-fixtures';
import { channel, planInput } from './plan-fixtures';
import { stepOf } from './reference/modules';

/** A charger that gives 10 A for 8 min and then cools for 2 min. */
const [ON_S, OFF_S] = [480, 120];
const plan = planInput({ channels: [channel('A1', { duty: 0.8 })] });
const option = planCharge(plan).options.find((one) => one.id === 'terminals/over-and-settle/id-A1')!;

interface Instant {
  s: number;
  amps: number;
  volts: number;
  ampHours: number;
}

/** The charge as the core and the rest's exponential have it, second by second of its pauses, every `everyS`. */
function course(everyS: number, untilS: number): Instant[] {
  const model = planModel(plan);
  let groups = model.groups;
  let ampHours = 0;
  const found: Instant[] = [];
  for (let s = 0; s < untilS; s += everyS) {
    const on = s % (ON_S + OFF_S) < ON_S;
    const run = chargeThroughTerminals(
      stepOf(
        groups,
        model.curve,
        { maxAmps: 10, setVolts: option.setVolts },
        { maxSeconds: everyS, relaxedVolts: null, cutoffAmps: 0.01 },
      ),
    );
    groups = groups.map((group, at) => ({
      ...group,
      restVolts: on ? voltsAtSoc(model.curve, run.groups[at]!.soc) : group.restVolts,
      polarisationVolts: on
        ? run.groups[at]!.polarisationVolts
        : (group.polarisationVolts ?? 0) * Math.exp(-everyS / group.polarisationTimeConstantS),
    }));
    if (on) ampHours += run.ampHours;
    const volts = groups.reduce((sum, group) => sum + group.restVolts + (group.polarisationVolts ?? 0), 0);
    found.push({ s: s + everyS, amps: on ? run.endAmps : 0, volts: on ? run.endTerminalVolts : volts, ampHours });
  }
  return found;
}

const reading = ({ s, amps, volts }: Instant): LiveReading => ({
  s,
  amps,
  terminalVolts: volts,
  celsius: null,
  groupVolts: null,
});
const at = (nowS: number, readings: LiveReading[]) => reckonCharge(reckonInput(plan, option, { nowS, readings }));
const currentS = option.currentEndS - option.currentStartS;

describe('a charger that pauses 2 min in 10', () => {
  const all = course(10, 0.8 * currentS);

  it('read every 10 s has the ampere-hours to 1 %, its end to 3 % and never an odd reading', () => {
    for (const share of [0.1, 0.25, 0.5, 0.75]) {
      const past = all.filter(({ s }) => s <= share * currentS);
      const then = past[past.length - 1]!;
      const seen = at(then.s, past.map(reading));
      expect(seen.odd).toBeNull();
      expect(Math.abs(seen.deliveredAh / then.ampHours - 1)).toBeLessThan(0.01);
      expect(Math.abs(seen.currentEndS / currentS - 1)).toBeLessThan(0.03);
    }
  });

  it('raises nothing in the midst of a pause, at any of its looks', () => {
    const from = all.findIndex(({ s }) => s > 0.4 * currentS);
    for (let length = from; length < from + 130; length += 3) {
      const past = all.slice(0, length);
      expect(at(past[length - 1]!.s, past.map(reading)).odd).toBeNull();
    }
  });

  it('read by hand every 14 min has the ampere-hours to 6 %, where the readings as they stand have them 20 % off', () => {
    // Read while it flows, as people do: 10 A each time.
    const by = all.filter(({ s, amps }) => s % 840 === 0 && amps > 0);
    const last = by[by.length - 1]!;
    const seen = at(last.s, by.map(reading));
    const asRead = (10 * last.s) / 3600;
    expect(Math.abs(asRead / last.ampHours - 1)).toBeGreaterThan(0.2);
    expect(Math.abs(seen.deliveredAh / last.ampHours - 1)).toBeLessThan(0.06);
    expect(seen.odd).toBeNull();
  });

  it('read once in a pause and never before goes on as planned', () => {
    const paused = all.find(({ s, amps }) => s > 0.3 * currentS && amps === 0)!;
    const seen = at(paused.s, [reading(paused)]);
    expect(seen.odd).toBeNull();
    expect(Math.abs(seen.currentEndS / currentS - 1)).toBeLessThan(0.02);
  });

  it('and then gives nothing for 25 min is dead, and said to be so within them', () => {
    const upTo = all.filter(({ s }) => s <= 0.3 * currentS);
    const last = upTo[upTo.length - 1]!;
    const dead = Array.from({ length: 150 }, (_, i) => ({ ...last, s: last.s + 10 * (i + 1), amps: 0 }));
    const readings = [...upTo, ...dead].map((one) => ({ ...reading(one), terminalVolts: null }));
    expect(at(last.s + 1500, readings).odd).toMatchObject({ kind: 'no-current', seen: 0 });
  });

  it('without pauses in what is known of it is said to give no current in the first of them', () => {
    const steady = planInput({ channels: [channel('A1')] });
    const own = planCharge(steady).options.find((one) => one.id === option.id)!;
    const past = all.filter(({ s }) => s <= 3 * (ON_S + OFF_S));
    const seen = reckonCharge(
      reckonInput(steady, own, { nowS: past[past.length - 1]!.s, readings: past.map(reading) }),
    );
    expect(seen.odd?.kind).toBe('no-current');
  });
});
