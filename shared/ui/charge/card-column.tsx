import type { ChargeCardDto } from '@/shared/contract/charge';
import { LevelColumn } from '../level-column/level-column';
import { columnGroups, columnScale } from './card-drawings';
import { stageOf } from './card-model';

/** The level column of a charge in a row: 60 px high, or larger in the row that leads. */
export function CardColumn({
  card,
  lagLimitVolts,
  large = false,
}: {
  card: ChargeCardDto;
  lagLimitVolts?: number;
  large?: boolean;
}) {
  return (
    <LevelColumn
      place="list"
      size={large && card.groups.length <= 4 ? { w: 17, gap: 6 } : {}}
      stage={stageOf(card)}
      groups={columnGroups(card, { lagLimitVolts }).map((group) => ({ ...group, clipVolts: null }))}
      targetVolts={card.targetVolts}
      toleranceVolts={card.toleranceVolts}
      scale={columnScale(card, 'list', lagLimitVolts)}
      reckoned={card.groups.some((group) => group.reckoned)}
      name={card.spare.label}
      tab
    />
  );
}
