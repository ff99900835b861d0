import type { FillModel } from './fill-model';

/** Worth that no plan goes over, in weighted minutes: all windows together filled with the densest pieces, the last one cut. */
export function fillBound({ pieces, windows }: FillModel): number {
  const used = new Set(pieces.flatMap((one) => one.windows));
  let left = 0;
  for (const at of used) {
    const { fromS, toS, clock } = windows[at]!;
    left += clock.between(clock.leave(Math.max(0, fromS)), toS);
  }
  let most = 0;
  for (const { longS, perSecond } of [...pieces].sort((one, other) => other.perSecond - one.perSecond)) {
    most += perSecond * Math.min(longS, left);
    left -= Math.min(longS, left);
  }
  return most;
}
