/** What stretch of volts a level column shows. Volts per cell group throughout. */

export type ColumnScale =
  /** The type's limits: lists, plan, wall. */
  | { kind: 'window'; lowVolts: number; highVolts: number }
  /** 50 mV beyond start and target, foot broken, ends printed: the live screen. */
  | { kind: 'reach'; lowVolts: number; highVolts: number }
  /** Target ±40 mV, tolerance as dashed lines, foot broken: near the end, and every check. */
  | { kind: 'near' };

export const nearVolts = 0.04;
const beyondVolts = 0.05;
/** A hundredth of a volt, since the ends are printed with two decimals and must be true. */
const outward = (volts: number, up: boolean) =>
  (up ? Math.ceil(volts * 100 - 1e-6) : Math.floor(volts * 100 + 1e-6)) / 100;

/** The `reach` of a charge: 50 mV beyond the lowest and highest of start, present and target. */
export function reachScale(
  startVolts: readonly number[],
  presentVolts: readonly number[],
  targetVolts: number,
): ColumnScale {
  const all = [...startVolts, ...presentVolts, targetVolts];
  return {
    kind: 'reach',
    lowVolts: outward(Math.min(...all) - beyondVolts, false),
    highVolts: outward(Math.max(...all) + beyondVolts, true),
  };
}

/** Whether every healthy group is within 40 mV of the target: the column then changes to `near`, as a cut. */
export const allNear = (groups: readonly { volts: number; odd?: boolean }[], targetVolts: number): boolean =>
  groups.some((group) => !group.odd) &&
  groups.every((group) => group.odd === true || Math.abs(group.volts - targetVolts) <= nearVolts + 1e-9);

/** The ends of a scale, V. */
export const scaleEnds = (scale: ColumnScale, targetVolts: number): { low: number; high: number } =>
  scale.kind === 'near'
    ? { low: targetVolts - nearVolts, high: targetVolts + nearVolts }
    : { low: scale.lowVolts, high: scale.highVolts };
