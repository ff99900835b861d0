import type { ReactNode } from 'react';
import { CardColumn } from '../charge/card-column';
import { LevelColumn } from '../level-column/level-column';
import type { ColumnSize } from '../level-column/size';
import type { StockItem } from './spare-model';

/** Vessels of a spare in a list: on a charge with its target and stage, on the shelf with the shelf voltage as notch. */
export function SpareColumn({ item, size }: { item: StockItem; size?: Partial<ColumnSize> }): ReactNode {
  const { spare, card } = item;
  if (card && card.stage !== 'planned' && card.stage !== 'queued' && !size) return <CardColumn card={card} />;
  const groups = card && card.stage !== 'planned' && card.stage !== 'queued' ? card.groups : null;
  const volts = groups?.map((group) => group.volts) ?? spare.reading?.groupVolts ?? [];
  if (volts.length === 0) return null;
  return (
    <LevelColumn
      place="list"
      size={size}
      stage={groups && card ? stageFor(card.stage) : 'planned'}
      groups={volts.map((value) => ({ volts: value, odd: value < spare.floorVolts }))}
      targetVolts={card?.targetVolts ?? spare.shelfVolts ?? spare.chargeLimitVolts}
      scale={{ kind: 'window', lowVolts: spare.dischargeLimitVolts, highVolts: spare.chargeLimitVolts }}
      reckoned={groups?.some((group) => group.reckoned)}
      twin=""
    />
  );
}

const stageFor = (stage: string) =>
  stage === 'charging' ||
  stage === 'discharging' ||
  stage === 'tapering' ||
  stage === 'resting' ||
  stage === 'check-due' ||
  stage === 'ready' ||
  stage === 'held'
    ? stage
    : 'planned';
