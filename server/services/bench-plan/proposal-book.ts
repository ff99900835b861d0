/** The proposals that screens have been shown, so that the one that is accepted is the one that was seen. */
import type { DataSource } from 'typeorm';
import type { Proposal } from './proposals';

export interface ShownMove {
  chargeId: string;
  rev: number;
  channelIds: string[];
  at: number;
}

/** Kept of each workshop; a screen that is so far behind hears what holds now. */
const KEPT = 20;

const books = new WeakMap<DataSource, Map<string, Map<string, ShownMove[]>>>();

function bookOf(dataSource: DataSource, workshopId: string): Map<string, ShownMove[]> {
  const all = books.get(dataSource) ?? new Map<string, Map<string, ShownMove[]>>();
  books.set(dataSource, all);
  const book = all.get(workshopId) ?? new Map<string, ShownMove[]>();
  all.set(workshopId, book);
  return book;
}

export function noteShown(dataSource: DataSource, workshopId: string, { id, moves }: Proposal): void {
  const book = bookOf(dataSource, workshopId);
  book.delete(id);
  book.set(
    id,
    moves.map(({ movable, then }) => ({
      chargeId: movable.file.charge.id,
      rev: movable.file.charge.rev,
      channelIds: then.channelIds,
      at: then.at,
    })),
  );
  if (book.size > KEPT) book.delete(book.keys().next().value!);
}

/** Null: nobody of this workshop was shown it since the server began. */
export const shownMoves = (dataSource: DataSource, workshopId: string, id: string): ShownMove[] | null =>
  bookOf(dataSource, workshopId).get(id) ?? null;
