import { findRoot } from '@/calc/step/find-root';
import { firstReach } from '@/calc/step/first-reach';
import { RosenbrockStep } from '@/calc/step/rosenbrock';
import { describe, expect, it } from 'vitest';

describe('the stiff method', () => {
  /** q' = I, v' = (R1·I − v)/τ with I = (V − q/C − v)/R: linear, so that its solution is a sum of two exponentials. */
  const [volts, farad, ohm, ohm1, tau] = [0.2, 5000, 0.002, 0.003, 40];
  const amps = (y: number[]) => (volts - y[0]! / farad - y[1]!) / ohm;
  const gradient = [-1 / (farad * ohm), -1 / ohm];

  function exact(s: number): [number, number] {
    const a = -1 / (farad * ohm);
    const b = -1 / ohm;
    const c = (ohm1 / tau) * a;
    const d = (ohm1 / tau) * b - 1 / tau;
    const middle = (a + d) / 2;
    const half = Math.sqrt(middle * middle - (a * d - b * c));
    // At rest: v = 0 and q = V·C. Deviations from there go with e^(λt).
    const [l1, l2] = [middle + half, middle - half];
    const [q0, v0] = [-volts * farad, 0];
    const at = (which: 'q' | 'v') => {
      const start = which === 'q' ? q0 : v0;
      const speed = which === 'q' ? a * q0 + b * v0 : c * q0 + d * v0;
      const k2 = (speed - l1 * start) / (l2 - l1);
      return (start - k2) * Math.exp(l1 * s) + k2 * Math.exp(l2 * s);
    };
    return [volts * farad + at('q'), at('v')];
  }

  function miss(steps: number): number {
    const method = new RosenbrockStep(2, [1, ohm1 / tau], [0, 1 / tau], amps);
    let y = [0, 0];
    const h = 60 / steps;
    for (let k = 0; k < steps; k++) {
      expect(method.step(y, h, amps(y), gradient)).toBe(true);
      y = method.result.slice();
    }
    return Math.abs(y[0]! - exact(60)[0]);
  }

  it('is of order 4: half the step leaves a sixteenth of the error', () => {
    const ratios = [miss(20) / miss(40), miss(40) / miss(80)];
    for (const ratio of ratios) {
      expect(ratio).toBeGreaterThan(12);
      expect(ratio).toBeLessThan(22);
    }
  });

  it('stays put at the end of a step of a million time constants', () => {
    const method = new RosenbrockStep(2, [1, ohm1 / tau], [0, 1 / tau], amps);
    method.step([0, 0], 4e7, amps([0, 0]), gradient);
    expect(Math.abs(method.result[0]! / (volts * farad) - 1)).toBeLessThan(1e-4);
    expect(Math.abs(method.result[1]!)).toBeLessThan(1e-4);
  });
});

describe('the zero of a function', () => {
  it.each([
    { name: 'x³ − 2', f: (x: number) => x ** 3 - 2, a: 0, b: 2, zero: Math.cbrt(2) },
    { name: 'e^x − 10⁵', f: (x: number) => Math.exp(x) - 1e5, a: 0, b: 20, zero: Math.log(1e5) },
    { name: 'a root at the end', f: (x: number) => x - 3, a: 3, b: 9, zero: 3 },
    { name: 'a step', f: (x: number) => (x < 1.25 ? -1 : 1), a: 0, b: 3, zero: 1.25 },
    { name: 'x⁹, flat at its zero', f: (x: number) => (x - 0.4) ** 9, a: 0, b: 1, zero: 0.4 },
  ])('$name, to 1e-9 and in under 70 looks', ({ f, a, b, zero }) => {
    let looks = 0;
    const counted = (x: number) => {
      looks++;
      return f(x);
    };
    expect(Math.abs(findRoot(counted, a, f(a), b, f(b), 1e-12) - zero)).toBeLessThan(1e-9);
    expect(looks).toBeLessThan(70);
  });
});

describe('the first time a level is reached', () => {
  it('of a rising function is its only one, or none', () => {
    const f = { rising: (s: number) => s * s, falling: null };
    expect(firstReach(f, 9, 100)).toBeCloseTo(3, 8);
    expect(firstReach(f, -1, 100)).toBe(0);
    expect(firstReach(f, 10_001, 100)).toBeNull();
  });

  it('of one that dips and comes again is the last of its rise, not missed between two looks', () => {
    // 0.05·e^(−s/100) falls while 1e-5·s rises: a dip in between, then up through 0.045 for good.
    const f = { rising: (s: number) => 1e-5 * s, falling: (s: number) => 0.05 * Math.exp(-s / 100) };
    const at = firstReach(f, 0.0505, 20_000)!;
    expect(f.rising(at) + f.falling(at)).toBeCloseTo(0.0505, 9);
    expect(at).toBeGreaterThan(5000);
  });

  it('of a bump a fraction of the whole long is found on the bump', () => {
    // Rises by 1 within 2 s around 500 s, and falls by 1 around 510 s.
    const f = {
      rising: (s: number) => 1 / (1 + Math.exp(-(s - 500) * 4)),
      falling: (s: number) => -1 / (1 + Math.exp(-(s - 510) * 4)),
    };
    const at = firstReach(f, 0.5, 100_000)!;
    expect(at).toBeCloseTo(500, 3);
  });
});
