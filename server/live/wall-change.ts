import type { BoardDto, WallChangeDto } from '@/shared/contract/board';

/** A board as it was told to walls, with the text of each part, by which one that looks otherwise is known. */
export interface ToldBoard {
  board: BoardDto;
  cards: ReadonlyMap<string, string>;
  order: string;
  rest: string;
  channels: string;
}

/** A card is made anew when it is read anew: the same one has the same text. */
const texts = new WeakMap<object, string>();
function textOf(card: object): string {
  const text = texts.get(card) ?? JSON.stringify(card);
  texts.set(card, text);
  return text;
}

export function toldBoard(board: BoardDto): ToldBoard {
  const { rev: _rev, at: _at, charges, channels, ...rest } = board;
  return {
    board,
    cards: new Map(charges.map((card) => [card.id, textOf(card)])),
    order: charges.map(({ id }) => id).join(' '),
    rest: JSON.stringify(rest),
    channels: JSON.stringify(channels),
  };
}

/** What walls that show `before` have to hear to show `after`; null: nothing. */
export function wallChange(before: ToldBoard, after: ToldBoard): WallChangeDto | null {
  const { charges, channels, ...rest } = after.board;
  const cards = charges.filter(({ id }) => before.cards.get(id) !== after.cards.get(id));
  const order = before.order === after.order ? null : charges.map(({ id }) => id);
  const other = before.channels === after.channels ? null : channels;
  const same = before.board.rev === rest.rev && before.rest === after.rest;
  if (same && cards.length === 0 && order === null && other === null) return null;
  return { ...rest, from: before.board.rev, cards, order, channels: other };
}
