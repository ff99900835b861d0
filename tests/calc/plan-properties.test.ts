import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  chargeThroughTerminals,
  chemistryParameters,
  planCharge,
  splitLongResistance,
  voltsAtSoc,
  type PlanInput,
  type PlanOption,
} from '@/calc/index';
import type { ChemistryId } from '@/calc/plan-types';
import { channel, lmoModule, lmoSpare, planInput, target } from './plan-fixtures';

const CHEMISTRY_IDS: ChemistryId[] = ['nmc', 'lmo-blend', 'lfp', 'lto', 'nimh'];

interface Draw {
  chemistry: ChemistryId;
  from: number[];
  to: number;
  capacityAh: number[];
  ohmAh: number;
  amps: number;
  toleranceVolts: number;
}

/** Modules of every chemistry with unequal groups, charged up by at least a tenth of their charge. */
const draws = fc
  .record({
    chemistry: fc.constantFrom(...CHEMISTRY_IDS),
    groups: fc.integer({ min: 1, max: 6 }),
    start: fc.double({ min: 0.1, max: 0.6, noNaN: true }),
    rise: fc.double({ min: 0.1, max: 0.35, noNaN: true }),
    spread: fc.array(fc.double({ min: -0.05, max: 0.05, noNaN: true }), { minLength: 6, maxLength: 6 }),
    sizes: fc.array(fc.double({ min: 0.85, max: 1.1, noNaN: true }), { minLength: 6, maxLength: 6 }),
    capacity: fc.double({ min: 5, max: 200, noNaN: true }),
    rate: fc.double({ min: 0.05, max: 0.5, noNaN: true }),
    factor: fc.double({ min: 0.5, max: 2, noNaN: true }),
    toleranceVolts: fc.double({ min: 0.002, max: 0.02, noNaN: true }),
  })
  .map(({ chemistry, groups, start, rise, spread, sizes, capacity, rate, factor, toleranceVolts }): Draw => {
    const { curve, resistanceOhmAh } = chemistryParameters(chemistry);
    return {
      chemistry,
      from: spread.slice(0, groups).map((off) => voltsAtSoc(curve, start + off)),
      to: voltsAtSoc(curve, start + rise),
      capacityAh: sizes.slice(0, groups).map((size) => size * capacity),
      ohmAh: resistanceOhmAh * factor,
      amps: rate * capacity,
      toleranceVolts,
    };
  });

const inputOf = (draw: Draw, over: { amps?: number; to?: number; toleranceVolts?: number } = {}): PlanInput => {
  const { chemistry, from, capacityAh } = draw;
  const known = chemistryParameters(chemistry);
  return planInput({
    module: {
      ...lmoModule,
      chemistry,
      groupsInSeries: from.length,
      ratedAh: capacityAh[0]!,
      chargeLimitVolts: known.chargeLimitVolts,
      dischargeLimitVolts: known.dischargeLimitVolts,
      floorVolts: known.recoveryFloorVolts,
      maxChargeAmps: 1000,
      resistanceOhm: draw.ohmAh / capacityAh[0]!,
    },
    spare: { ...lmoSpare, groupVolts: from, capacityAh },
    target: { ...target, volts: over.to ?? draw.to, toleranceVolts: over.toleranceVolts ?? draw.toleranceVolts },
    channels: [channel('A1', { maxAmps: over.amps ?? draw.amps, displayStepVolts: 0 })],
    samples: 1,
  });
};

/** Options that end inside the tolerance, by id. */
const good = (input: PlanInput): Map<string, PlanOption> =>
  new Map(
    planCharge(input)
      .options.filter((one) => one.withinTolerance)
      .map((one) => [one.id, one]),
  );

/** Every option that both plans have: the second may not be later than the first by more than rounding of the set voltage. */
function neverLater(first: PlanInput, second: PlanInput, pick: (option: PlanOption) => boolean = () => true): void {
  const others = good(second);
  for (const [id, option] of good(first)) {
    const other = others.get(id);
    if (!other || !pick(option) || !pick(other)) continue;
    expect(other.currentEndS, `${id}: ${other.currentEndS} s after ${option.currentEndS} s`).toBeLessThanOrEqual(
      option.currentEndS * 1.005 + 5,
    );
  }
}

describe('whatever the module', () => {
  it('more amps are never later, over 80 modules', () => {
    fc.assert(
      fc.property(draws, fc.double({ min: 1.05, max: 3, noNaN: true }), (draw, factor) =>
        neverLater(inputOf(draw), inputOf(draw, { amps: draw.amps * factor })),
      ),
      { numRuns: 80 },
    );
  });

  it('a higher target is never sooner over and settle, over 80 modules (on the mark a flat target tapers longer)', () => {
    fc.assert(
      fc.property(draws, fc.double({ min: 0.01, max: 0.1, noNaN: true }), (draw, more) => {
        const { curve } = chemistryParameters(draw.chemistry);
        const to = Math.min(voltsAtSoc(curve, 0.97), draw.to + more * (voltsAtSoc(curve, 0.97) - draw.to));
        // Through the terminals and one group after the other; a trim may need one swap of the clips less at a higher target.
        neverLater(
          inputOf(draw, { to }),
          inputOf(draw),
          (option) => option.finish === 'over-and-settle' && option.steps.every((step) => step.kind === 'bulk'),
        );
      }),
      { numRuns: 80 },
    );
  });

  it('a wider tolerance is never later over and settle with as many steps, over 80 modules (on the mark the aim moves up to the middle of the groups)', () => {
    fc.assert(
      fc.property(draws, fc.double({ min: 1.1, max: 3, noNaN: true }), (draw, factor) => {
        const narrow = inputOf(draw);
        const wide = inputOf(draw, { toleranceVolts: draw.toleranceVolts * factor });
        const [tight, loose] = [good(narrow), good(wide)];
        // Groups that all end inside need no trim: the one stretch aims at their middle and may taper a little longer.
        const sameSteps = (id: string) => loose.get(id)?.steps.length === tight.get(id)?.steps.length;
        neverLater(narrow, wide, (option) => option.finish === 'over-and-settle' && sameSteps(option.id));
      }),
      { numRuns: 80 },
    );
  });

  it('a charger forgotten at the planned set voltage leaves every group at or under its limit, over 80 modules', () => {
    fc.assert(
      fc.property(draws, fc.constantFrom(0.5, 0.9, 1), (draw, near) => {
        const known = chemistryParameters(draw.chemistry);
        const to = draw.to + near * (known.chargeLimitVolts - draw.to) * 0.98;
        for (const option of planCharge(inputOf(draw, { to })).options) {
          const bulk = option.steps[0]!;
          if (bulk.way !== 'terminals' || bulk.setVolts === null) continue;
          const groups = draw.from.map((restVolts, at) => ({
            capacityAh: draw.capacityAh[at]!,
            ...splitLongResistance(draw.ohmAh / draw.capacityAh[0]!),
            polarisationTimeConstantS: known.polarisationTimeConstantS,
            restVolts,
          }));
          const forgotten = chargeThroughTerminals({
            groups,
            curve: known.curve,
            linkResistanceOhm: 0,
            coulombicEfficiency: known.coulombicEfficiency,
            direction: 'charge',
            source: {
              maxAmps: bulk.setAmps,
              setVolts: bulk.setVolts,
              maxWatts: null,
              leadResistanceOhm: 0,
              heldGroupVolts: null,
              loadOhm: null,
            },
            stop: { relaxedVolts: null, toleranceVolts: 0, cutoffAmps: draw.amps * 1e-4, groupVolts: null },
            settledVolts: 1e-4,
          });
          expect(forgotten.outcome).toBe('cutoff');
          for (const group of forgotten.groups)
            expect(voltsAtSoc(known.curve, group.soc)).toBeLessThanOrEqual(known.chargeLimitVolts + 1e-6);
        }
      }),
      { numRuns: 80 },
    );
  });

  it('a load forgotten at the planned set voltage leaves every group at or over its limit, over 80 modules', () => {
    fc.assert(
      fc.property(draws, (draw) => {
        const known = chemistryParameters(draw.chemistry);
        const down: Draw = {
          ...draw,
          from: draw.from.map((volts) => volts + draw.to - Math.min(...draw.from)),
          to: Math.min(...draw.from),
        };
        const input = inputOf(down);
        const plan = planCharge({
          ...input,
          module: { ...input.module, maxDischargeAmps: 1000 },
          channels: [channel('D1', { canDischarge: true, dischargeAmps: draw.amps, displayStepVolts: 0 })],
        });
        const found = plan.options.filter((option) => option.way === 'terminals' && option.direction === 'discharge');
        for (const { steps } of found) {
          const bulk = steps[0]!;
          const forgotten = chargeThroughTerminals({
            groups: down.from.map((restVolts, at) => ({
              capacityAh: draw.capacityAh[at]!,
              ...splitLongResistance(draw.ohmAh / draw.capacityAh[0]!),
              polarisationTimeConstantS: known.polarisationTimeConstantS,
              restVolts,
            })),
            curve: known.curve,
            linkResistanceOhm: 0,
            coulombicEfficiency: 1,
            direction: 'discharge',
            source: {
              maxAmps: bulk.setAmps,
              setVolts: bulk.setVolts,
              maxWatts: null,
              leadResistanceOhm: 0,
              heldGroupVolts: null,
              loadOhm: null,
            },
            stop: { relaxedVolts: null, toleranceVolts: 0, cutoffAmps: draw.amps * 1e-4, groupVolts: null },
            settledVolts: 1e-4,
          });
          for (const group of forgotten.groups)
            expect(voltsAtSoc(known.curve, group.soc)).toBeGreaterThanOrEqual(known.dischargeLimitVolts - 1e-6);
        }
      }),
      { numRuns: 80 },
    );
  });

  it('every option is complete and in order: steps after each other, segments without gaps, band around its middle', () => {
    fc.assert(
      fc.property(draws, (draw) => {
        const plan = planCharge({ ...inputOf(draw), samples: 16 });
        for (const option of plan.options) {
          const { p10, p50, p90 } = option.totalS;
          expect(p10).toBeLessThanOrEqual(p50);
          expect(p50).toBeLessThanOrEqual(p90);
          option.segments.slice(1).forEach((one, at) => expect(one.fromS).toBeCloseTo(option.segments[at]!.toS, 4));
          expect(option.segments[0]!.fromS).toBe(0);
          expect(option.segments.at(-1)!.toS).toBeCloseTo(p50, 4);
          expect(Object.values(option).every((value) => typeof value !== 'number' || Number.isFinite(value))).toBe(
            true,
          );
          option.steps.forEach((step) => {
            expect(step.stopS).toBeGreaterThanOrEqual(step.startS);
            expect(
              step.setVolts === null ||
                option.setVoltsCap === null ||
                step.kind === 'trim' ||
                step.setVolts <= option.setVoltsCap + 1e-6,
            ).toBe(true);
          });
        }
        for (const one of plan.ruledOut) expect(one.reason).toMatch(/^[A-Z].*\.$/);
      }),
      { numRuns: 60 },
    );
  });
});
