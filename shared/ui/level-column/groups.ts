import { threeAbove } from './size';

/** One cell group as a column shows it. */
export interface ColumnGroup {
  /** Rest voltage, V. */
  volts: number;
  /** Rest voltage where the charge began. */
  beganVolts?: number | null;
  /** Voltage at the clips while current flows. */
  clipVolts?: number | null;
  /** Off by more than the lag limit. */
  odd?: boolean;
  /** 1-based; left out, the place in the list counts. */
  number?: number;
  /** Printed above the vessel: '3.855', '+2'. */
  text?: string;
}

export interface DrawnGroup extends ColumnGroup {
  number: number;
  /** Set where only three of many are drawn. */
  rank?: 'lowest' | 'median' | 'highest';
}

/** The groups that are drawn: all up to 16, of more only the lowest, the median and the highest, by their own names. */
export function drawnGroups(groups: readonly ColumnGroup[]): DrawnGroup[] {
  const named = groups.map((group, index) => ({ ...group, number: group.number ?? index + 1 }));
  if (named.length <= threeAbove) return named;
  const byVolts = [...named].sort((a, b) => a.volts - b.volts || a.number - b.number);
  const pick = (index: number, rank: DrawnGroup['rank']): DrawnGroup[] => {
    const group = byVolts[index];
    return group ? [{ ...group, rank }] : [];
  };
  return [
    ...pick(0, 'lowest'),
    ...pick(Math.floor((byVolts.length - 1) / 2), 'median'),
    ...pick(byVolts.length - 1, 'highest'),
  ];
}
