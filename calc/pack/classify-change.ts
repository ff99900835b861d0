import { CHANGE_SDS, READING_VOLTS } from '../parameters/pack';
import { requirePositive } from '../require';
import { inverseNormal } from '../statistics/inverse-normal';
import type { OcvTable } from '../types';
import { balanceCounts, type Likely, type PackReading } from './pack-reading';
import { spreadDrop, spreadFigure } from './spread-figure';

export type ChangeKind = 'exchange' | 'no-change' | 'balanced' | 'worse';

export interface ChangeOptions {
  curve: OcvTable;
  /** Ah of a group; one for all, or one for each. */
  capacityAh: number | number[];
  /** Scatter of a single reading, one standard deviation, V; default 1 mV. */
  noiseVolts?: number;
}

export interface PackChange {
  kind: ChangeKind;
  /**
   * What came off the spread, with the 10th and 90th percentile, Ah; below 0: it grew. Null for the exchange: that took a
   * module out, and bled nothing.
   */
  ampHours: Likely | null;
  beforeVolts: number;
  afterVolts: number;
  /** Mean state of charge at either reading: millivolts of the one do not compare with those of the other. */
  beforeSoc: number;
  afterSoc: number;
}

const TO_P90 = inverseNormal(0.9);

/**
 * What happened to the pack's spread between two readings. Judged in ampere-hours, since millivolts at different states of
 * charge do not compare: a drop beyond two standard deviations is one, a rise beyond two is worse, the rest no change. A drop
 * from arrival to a later stage is the exchange of the module; other drops are what balancing took off.
 *
 * @throws CalcInputError for readings that cannot be, of different packs, or in the wrong order
 */
export function classifyChange(before: PackReading, after: PackReading, options: ChangeOptions): PackChange {
  balanceCounts([before, after]);
  const noise = requirePositive('noiseVolts', options.noiseVolts ?? READING_VOLTS);
  const [first, second] = [before, after].map(({ volts }) =>
    spreadFigure(volts, options.curve, options.capacityAh, noise),
  ) as [ReturnType<typeof spreadFigure>, ReturnType<typeof spreadFigure>];
  const { mean, sd } = spreadDrop(first, second);
  const changed = mean > CHANGE_SDS * sd ? 'balanced' : mean < -CHANGE_SDS * sd ? 'worse' : 'no-change';
  const kind = changed === 'balanced' && before.stage === 'arrival' && after.stage !== 'arrival' ? 'exchange' : changed;
  return {
    kind,
    ampHours: kind === 'exchange' ? null : { low: mean - TO_P90 * sd, likely: mean, high: mean + TO_P90 * sd },
    beforeVolts: first.spreadVolts,
    afterVolts: second.spreadVolts,
    beforeSoc: first.soc,
    afterSoc: second.soc,
  };
}
