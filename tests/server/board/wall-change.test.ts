import fc from 'fast-check';
import { expect, it } from 'vitest';
import { toldBoard, wallChange } from '@/server/live/wall-change';
import { withWallChange } from '@/shared/client/wall-change';
import type { BoardDto } from '@/shared/contract/board';
import type { ChargeCardDto } from '@/shared/contract/charge';

const card = fc.record({ id: fc.constantFrom('a', 'b', 'c', 'd', 'e', 'f'), title: fc.constantFrom('one', 'two') });
const board = fc
  .record({
    rev: fc.integer({ min: 1, max: 3 }),
    cards: fc.uniqueArray(card, { selector: ({ id }) => id }),
    channels: fc.subarray(['A1', 'B1', 'C1']),
    name: fc.constantFrom('Quay Street', 'Mill Lane'),
    next: fc.option(fc.constantFrom('R-1', 'R-2')),
  })
  .map(({ rev, cards, channels, name, next }): BoardDto => ({
    ...{ rev, at: `2026-06-09T11:42:0${rev}.000Z`, workshop: { id: 'w', name, zone: 'Europe/Berlin' } },
    // Cards and channels are passed on as they are; what else is in them does not matter here.
    charges: cards as unknown as ChargeCardDto[],
    channels: channels.map((id) => ({ id })) as unknown as BoardDto['channels'],
    ...{ next: next as unknown as BoardDto['next'], openToday: null },
  }));

it('what is told between any two boards makes the one from the other, letter by letter (2000 pairs)', () => {
  fc.assert(
    fc.property(board, board, (before, after) => {
      const change = wallChange(toldBoard(before), toldBoard(after));
      const sent = change && (JSON.parse(JSON.stringify(change)) as typeof change);
      const { at: _then, ...shown } = sent ? withWallChange(before, sent)! : before;
      const { at: _now, ...wanted } = after;
      expect(shown).toEqual(wanted);
      // Nothing is sent that the wall has already.
      for (const one of sent?.cards ?? []) expect(before.charges).not.toContainEqual(one);
    }),
    { numRuns: 2000 },
  );
});

it('a wall with another revision, or without a card that stands in the order, is not given a board', () => {
  fc.assert(
    fc.property(board, board, board, (before, after, other) => {
      const change = wallChange(toldBoard(before), toldBoard(after));
      if (!change) return;
      const given = withWallChange(other, change);
      if (other.rev !== before.rev) expect(given).toBeNull();
      else if (given && change.order) expect(given.charges.map(({ id }) => id)).toEqual(change.order);
    }),
    { numRuns: 2000 },
  );
});
