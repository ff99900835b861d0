/** The charges that wait, and where else each could go. */
import type { QueueRowDto } from '@/shared/contract/bench-plan';
import { chargeCard } from '../charge-dto';
import { isWaitingToStart } from '../charge-stages';
import { clockText, listText, titleOf } from '../charge-words';
import { toOptionalInstant } from '../instants';
import { placedBy, type BenchModel, type Movable, type Placed } from './bench-model';
import { dueOf } from './ground';
import { soonestAt } from './moves.service';
import { idOf } from './present-plan';
import { channelNamesOf, laterText } from './proposal-words';

export function queueRows(model: BenchModel): QueueRowDto[] {
  const { ground } = model;
  return ground.files
    .filter(({ charge }) => isWaitingToStart(charge.stage))
    .map((file) => {
      const { charge } = file;
      const card = chargeCard(file, ground.now);
      const ready = card.ready ?? card.plannedReady;
      const dueAt = dueOf(ground, file);
      const late = dueAt === null ? 0 : Math.max(0, Date.parse(ready.late) - dueAt);
      const movable = model.movables.find((one) => idOf(one) === charge.id);
      return {
        chargeId: charge.id,
        rev: charge.rev,
        title: titleOf(charge),
        stage: charge.stage as QueueRowDto['stage'],
        channelNames: card.channelNames,
        clipOnAt: card.clipOnAt,
        ready,
        dueAt: toOptionalInstant(dueAt),
        lateByMinutes: Math.round(late / 60_000),
        otherwise: movable ? otherwiseText(model, movable, Date.parse(ready.likely)) : null,
      };
    })
    .sort((a, b) => Date.parse(a.clipOnAt) - Date.parse(b.clipOnAt));
}

/** 'On B1 at 15:30 it is ready 30 min later.'; null: no other channel can have it. */
function otherwiseText(model: BenchModel, movable: Movable, readyAt: number): string | null {
  const here = movable.present.channelIds;
  let best: Placed | null = null;
  for (const alternative of movable.alternatives) {
    if (alternative.channelIds.some((id) => here.includes(id))) continue;
    const at = soonestAt(model, movable, alternative);
    if (at === null) continue;
    const placed = placedBy(alternative, at);
    if (best === null || likelyOf(placed) < likelyOf(best)) best = placed;
  }
  if (best === null) return null;
  const { file } = movable;
  const names = listText(channelNamesOf(file, best.channelIds));
  const clock = clockText(best.at, file.workshop.zone, model.ground.now);
  return `On ${names} at ${clock} it is ready ${laterText(readyAt, likelyOf(best))}.`;
}

const likelyOf = ({ at, totalS }: Placed): number => at + totalS.p50 * 1000;
