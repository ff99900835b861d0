import type { BoardDto, WallChangeDto } from '@/shared/contract/board';

/** The board with what changed in it; null where the change is of another board than this one. */
export function withWallChange(board: BoardDto, change: WallChangeDto): BoardDto | null {
  const { from, cards, order, channels, ...rest } = change;
  if (board.rev !== from) return null;
  const byId = new Map([...board.charges, ...cards].map((card) => [card.id, card]));
  const charges = (order ?? board.charges.map(({ id }) => id)).flatMap((id) => byId.get(id) ?? []);
  if (order !== null && charges.length !== order.length) return null;
  return { ...rest, channels: channels ?? board.channels, charges };
}
