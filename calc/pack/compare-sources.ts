import { CalcInputError } from '../errors';
import { OFFSET_UNKNOWN_VOLTS, READING_VOLTS } from '../parameters/pack';
import { requireNotNegative } from '../require';
import { quantile } from '../statistics/quantile';
import { requireGroup, requireGroupVolts, requireVolts } from './group-volts';
import type { GroupVolts } from './odd-groups';

export interface CompareSourcesInput {
  /** Of each group by the pack's own instrument, V. */
  packVolts: number[];
  /** 0-based groups of the suspected module. */
  oddModule: number[];
  /** By the hand meter: groups of the suspected module, and healthy ones for the offset between the instruments. */
  meterGroups: GroupVolts[];
  /** What two instruments may differ by in one group once their offset is taken off, V. */
  toleranceVolts: number;
  /** Scatter of a single reading, one standard deviation, V; default 1 mV. */
  noiseVolts?: number;
  /** What two instruments may be apart where no healthy group was read by both, V; default 10 mV. */
  offsetUnknownVolts?: number;
}

export interface ComparedGroup {
  group: number;
  packVolts: number;
  meterVolts: number;
  /** Meter minus pack, the offset taken off, V. */
  differenceVolts: number;
  differs: boolean;
}

export interface SourceComparison {
  verdict: 'agree' | 'disagree';
  /** Meter minus pack: median over the healthy groups that both read; null: none was. */
  offsetVolts: number | null;
  /** What a group was allowed to differ by, V. */
  allowedVolts: number;
  /** The suspected module's groups that were read by hand, rising. */
  groups: ComparedGroup[];
  /** Those that differ. */
  differing: number[];
  /** The suspected module's groups that nobody read by hand: nothing is said of them. */
  notRead: number[];
}

/**
 * Whether a hand meter at the suspected module tells the same as the pack's own instrument, group by group. Two instruments
 * have an offset: the median of meter − pack over healthy groups, where given, is taken off; where none is given the
 * offset is allowed for in the limit. Two readings scatter by √2 of one: twice that is allowed on top of the tolerance.
 *
 * @throws CalcInputError for volts or groups that cannot be, a group read twice, or where no suspected group was read
 */
export function compareSources(input: CompareSourcesInput): SourceComparison {
  const { packVolts, oddModule, meterGroups } = input;
  requireGroupVolts('packVolts', packVolts);
  oddModule.forEach((group, at) => requireGroup(`oddModule[${at}]`, group, packVolts.length));
  const tolerance = requireNotNegative('toleranceVolts', input.toleranceVolts);
  const noise = requireNotNegative('noiseVolts', input.noiseVolts ?? READING_VOLTS);
  const unknown = requireNotNegative('offsetUnknownVolts', input.offsetUnknownVolts ?? OFFSET_UNKNOWN_VOLTS);
  const byMeter = new Map<number, number>();
  meterGroups.forEach(({ group, volts }, at) => {
    requireGroup(`meterGroups[${at}].group`, group, packVolts.length);
    requireVolts(`meterGroups[${at}].volts`, volts);
    if (byMeter.has(group)) throw new CalcInputError(`meterGroups[${at}].group`, group, 'named once');
    byMeter.set(group, volts);
  });
  const suspected = [...new Set(oddModule)].sort((a, b) => a - b);
  const read = suspected.filter((group) => byMeter.has(group));
  if (read.length === 0)
    throw new CalcInputError('meterGroups', meterGroups, 'such that a group of the suspected module is among them');

  const apart = (group: number): number => byMeter.get(group)! - packVolts[group]!;
  const healthy = [...byMeter.keys()].filter((group) => !suspected.includes(group));
  const offsetVolts = healthy.length > 0 ? quantile(healthy.map(apart), 0.5) : null;
  const allowedVolts = tolerance + 2 * Math.SQRT2 * noise + (offsetVolts === null ? unknown : 0);
  const groups = read.map((group): ComparedGroup => {
    const differenceVolts = apart(group) - (offsetVolts ?? 0);
    return {
      group,
      packVolts: packVolts[group]!,
      meterVolts: byMeter.get(group)!,
      differenceVolts,
      differs: Math.abs(differenceVolts) > allowedVolts,
    };
  });
  const differing = groups.filter(({ differs }) => differs).map(({ group }) => group);
  return {
    verdict: differing.length === 0 ? 'agree' : 'disagree',
    offsetVolts,
    allowedVolts,
    groups,
    differing,
    notRead: suspected.filter((group) => !byMeter.has(group)),
  };
}
