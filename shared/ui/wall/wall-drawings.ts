/** What column and ribbon of a row need, out of its card. Seconds count from `zero` (epoch ms). */
import { cardRibbon, columnGroups, columnScale, type CardRibbon } from '../charge/card-drawings';
import type { ColumnGroup } from '../level-column/groups';
import type { ColumnScale } from '../level-column/scale';
import type { StageId } from '../stage/stages';
import type { WallCard, WallClock } from './wall-model';

export interface ColumnOfCard {
  groups: ColumnGroup[];
  targetVolts: number;
  toleranceVolts: number;
  scale: ColumnScale;
  stage: StageId;
  reckoned: boolean;
}

/** The level column: near the target once every healthy group is within 40 mV. Marks at the clips are too small here. */
export const columnOf = (card: WallCard): ColumnOfCard => ({
  groups: columnGroups(card).map((group) => ({ ...group, clipVolts: null })),
  targetVolts: card.targetVolts,
  toleranceVolts: card.toleranceVolts,
  scale: columnScale(card, 'list'),
  stage: card.stage,
  reckoned: card.groups.some((group) => group.reckoned),
});

export type RibbonOfCard = Pick<
  CardRibbon,
  'segments' | 'band' | 'hanging' | 'heldFromS' | 'stoppedAtS' | 'lookIns'
> & { nowS: number };

/** The wait ribbon on the clock of `zero`. Only a look-in that is due has its peg, on the now line. */
export function ribbonOf(card: WallCard, { now, boardAt }: WallClock, zero: number): RibbonOfCard {
  const { segments, band, hanging, heldFromS, stoppedAtS } = cardRibbon(card, { now, asOf: boardAt }, zero);
  const nowS = (now - zero) / 1000;
  const due = card.nextLookInAt !== null && Date.parse(card.nextLookInAt) <= now;
  return {
    segments,
    band,
    nowS,
    hanging,
    heldFromS,
    stoppedAtS: card.stage === 'stopped' ? stoppedAtS : null,
    lookIns: due ? [{ s: nowS, state: 'next' }] : [],
  };
}

/** A row's own axis, for the narrow cells: from its begin, or now, to its latest finish. */
export function ownAxis({ segments, band, nowS }: RibbonOfCard): { fromS: number; toS: number } {
  const begin = segments[0]?.fromS ?? nowS;
  const end = band?.p90 ?? (segments.at(-1)?.toS ?? nowS) + 600;
  return { fromS: Math.min(begin, nowS), toS: Math.max(nowS + 240, end) };
}
