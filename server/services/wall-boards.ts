import { brotliCompressSync, constants, gzipSync } from 'node:zlib';
import type { BoardDto } from '@/shared/contract/board';

/** A board says what holds at an instant (what is late, say), so it is read anew after this, ms. */
const SHARED_MS = 1000;
/** Of brotli: what a board takes to pack counts, it is packed while walls wait. */
const BROTLI_QUALITY = 4;

export type BoardCoding = 'br' | 'gzip' | 'identity';

/** One board as it goes out, packed once for all who take it so. */
export interface PackedBoard {
  body(coding: BoardCoding): Buffer;
}

/**
 * The board of a workshop's walls, read once for all of them. An announcement reaches them all at the same moment, and
 * the board of a full workshop takes long to read: one by one, the last of many walls would wait for minutes.
 */
export interface WallBoards {
  /** The board as it is at `now` or became in the second before; never one from before the last `changed`. */
  read(workshopId: string, now: number): Promise<PackedBoard>;
  /** Something of this workshop was committed: what was read before it, or is being read, is for nobody who asks now. */
  changed(workshopId: string): void;
}

/** @param readBoard reads it from the database */
export function makeWallBoards(readBoard: (workshopId: string, now: number) => Promise<BoardDto>): WallBoards {
  const boards = new Map<string, { at: number; board: Promise<PackedBoard> }>();
  return {
    read(workshopId, now) {
      const there = boards.get(workshopId);
      // Before it, too: the clock may have been set back.
      if (there && Math.abs(now - there.at) < SHARED_MS) return there.board;
      const entry = { at: now, board: readBoard(workshopId, now).then(packed) };
      boards.set(workshopId, entry);
      entry.board.catch(() => {
        if (boards.get(workshopId) === entry) boards.delete(workshopId);
      });
      return entry.board;
    },
    changed: (workshopId) => void boards.delete(workshopId),
  };
}

const pack: Record<BoardCoding, (text: Buffer) => Buffer> = {
  br: (text) => brotliCompressSync(text, { params: { [constants.BROTLI_PARAM_QUALITY]: BROTLI_QUALITY } }),
  gzip: (text) => gzipSync(text),
  identity: (text) => text,
};

function packed(board: BoardDto): PackedBoard {
  const text = Buffer.from(JSON.stringify(board));
  const bodies = new Map<BoardCoding, Buffer>();
  return {
    body(coding) {
      const body = bodies.get(coding) ?? pack[coding](text);
      bodies.set(coding, body);
      return body;
    },
  };
}
