import { columnGroups, columnScale } from '../charge/card-drawings';
import { stageOf } from '../charge/card-model';
import { LevelColumn } from '../level-column/level-column';
import type { ColumnSize } from '../level-column/size';
import type { StockItem } from './spare-model';

/** Four groups and more are drawn slimmer, so that the words beside them keep their place. */
const slimFrom = 4;

/**
 * Vessels of a spare in a list: on a charge with its target and stage, on the shelf with the shelf voltage as notch. The
 * words beside it say the same to readers.
 */
export function SpareColumn({ item, size = {} }: { item: StockItem; size?: Partial<ColumnSize> }) {
  const { spare, card } = item;
  const begun = card !== null && card.stage !== 'planned' && card.stage !== 'queued' ? card : null;
  const volts = spare.reading?.groupVolts ?? [];
  if (!begun && volts.length === 0) return null;
  const count = begun ? begun.groups.length : volts.length;
  return (
    <LevelColumn
      place="list"
      size={{ ...(count >= slimFrom ? { w: 7, gap: 3 } : {}), ...size }}
      stage={begun ? stageOf(begun) : 'planned'}
      groups={begun ? columnGroups(begun) : volts.map((value) => ({ volts: value, odd: value < spare.floorVolts }))}
      targetVolts={card?.targetVolts ?? spare.shelfVolts ?? spare.chargeLimitVolts}
      scale={
        begun
          ? columnScale(begun, 'list')
          : { kind: 'window', lowVolts: spare.dischargeLimitVolts, highVolts: spare.chargeLimitVolts }
      }
      toleranceVolts={begun?.toleranceVolts}
      reckoned={begun?.groups.some((group) => group.reckoned)}
      tab={false}
      twin=""
    />
  );
}
