import type { ChargeCardDto } from '@/shared/contract/charge';
import { LevelColumn } from '../level-column/level-column';
import { columnGroups, columnScale } from './card-drawings';
import { stageOf } from './card-model';

/** The level column of a charge in a row of the bench. */
export function CardColumn({ card, large = false }: { card: ChargeCardDto; large?: boolean }) {
  return (
    <LevelColumn
      place="list"
      size={large ? { w: 24, gap: 7, h: 76 } : {}}
      stage={stageOf(card)}
      groups={columnGroups(card)}
      targetVolts={card.targetVolts}
      toleranceVolts={card.toleranceVolts}
      scale={columnScale(card, 'list')}
      reckoned={card.groups.some((group) => group.reckoned)}
      name={card.spare.label}
      tab
    />
  );
}
