/** What the second source says, in words, while it is typed. Pure. */
import { compareSources } from '@/calc/pack/compare-sources';
import { groupsAt, type PackInput } from '@/shared/contract/pack';
import { SOURCE_TOLERANCE_VOLTS, type PackReadingDto } from '@/shared/contract/pack-reading';
import { millivolts } from '../format/quantities';

export interface SourceTyped {
  modulePosition: string;
  /** As typed, one for each group of the module. */
  groupVolts: string[];
  /** Number of the healthy group, from 1, and its volts; both or none. */
  healthyGroup: string;
  healthyVolts: string;
  meterId: string;
  pointsTo: string;
}

export interface SourceVerdict {
  agrees: boolean;
  text: string;
}

/**
 * Whether the meter agrees with the pack so far; null: not every group of the module is typed.
 *
 * @param volts of the module's groups, V; null: not typed yet
 */
export function sourceVerdict(
  pack: Pick<PackInput, 'groupCount' | 'groupsPerModule' | 'positionOfGroup'>,
  reading: Pick<PackReadingDto, 'groupVolts' | 'oddPositions'>,
  meter: {
    modulePosition: string;
    volts: readonly (number | null)[];
    healthy: { group: number; volts: number } | null;
    pointsTo: string | null;
  },
): SourceVerdict | null {
  const groups = groupsAt(pack, meter.modulePosition);
  const { modulePosition: position, pointsTo } = meter;
  if (groups.length === 0 || meter.volts.length !== groups.length) return null;
  const read = groups.flatMap((group, at) => {
    const volts = meter.volts[at] ?? null;
    return volts === null ? [] : [{ group, volts }];
  });
  if (read.length < groups.length) return null;
  if (pointsTo !== null && pointsTo !== position)
    return { agrees: false, text: `The pack says module ${position}, your meter says ${pointsTo}.` };
  if (!reading.oddPositions.includes(position))
    return { agrees: false, text: `The pack does not point to module ${position}.` };
  const healthy = meter.healthy !== null && !groups.includes(meter.healthy.group) ? [meter.healthy] : [];
  const found = compareSources({
    packVolts: [...reading.groupVolts],
    oddModule: groups,
    meterGroups: [...read, ...healthy],
    toleranceVolts: SOURCE_TOLERANCE_VOLTS,
  });
  if (found.verdict === 'agree') return { agrees: true, text: `The meter agrees with the pack at module ${position}.` };
  const apart = found.groups
    .filter(({ differs }) => differs)
    .map(({ group, differenceVolts }) => `G${group + 1} by ${millivolts(Math.abs(differenceVolts))}`);
  return { agrees: false, text: `The meter disagrees with the pack: ${apart.join(', ')}.` };
}
