import { pointMarks, type LocaleMarks } from '../format/marks';
import { millivolts, tolerance, volts } from '../format/quantities';
import { stages, type StageId } from '../stage/stages';
import { drawnGroups, type ColumnGroup } from './groups';

/**
 * The column in words, for readers: 'Charging. Target 3.905 V, ±5 mV. G1 3.855 V, G2 3.854 V, G3 3.849 V, odd.' Of many
 * groups lowest, median and highest are told, and every odd one.
 */
export function columnTwin({
  groups,
  targetVolts,
  toleranceVolts,
  stage,
  name,
  reckoned,
  floorVolts,
  marks = pointMarks,
}: {
  groups: readonly ColumnGroup[];
  targetVolts: number;
  toleranceVolts: number;
  stage: StageId;
  /** 'S-0398' */
  name?: string;
  reckoned?: boolean;
  floorVolts?: number | null;
  marks?: LocaleMarks;
}): string {
  const shown = drawnGroups(groups);
  const told = new Set(shown.map((group) => group.number));
  const oddOnes = groups
    .map((group, index) => ({ ...group, number: group.number ?? index + 1 }))
    .filter((group) => group.odd && !told.has(group.number));
  const of = (group: ColumnGroup & { number: number; rank?: string }) => {
    const off = group.odd
      ? `, odd, ${millivolts(Math.abs(group.volts - targetVolts))} ${group.volts < targetVolts ? 'below' : 'above'}`
      : '';
    return `${group.rank ? `${group.rank} ` : ''}G${group.number} ${volts(group.volts, marks)}${off}`;
  };
  return [
    `${name ? `${name}: ` : ''}${stages[stage].word}.`,
    `Target ${volts(targetVolts, marks)}, ${tolerance(toleranceVolts)}.`,
    `${[...shown, ...oddOnes].map(of).join(', ')}${reckoned ? ', reckoned from readings under current' : ''}.`,
    ...(floorVolts == null ? [] : [`Floor ${volts(floorVolts, marks)}.`]),
  ].join(' ');
}
