import type { Request, Response } from 'express';
import type { BoardCoding, PackedBoard } from '../services/wall-boards';

/** Sends a board that is packed already, in the way of packing that the asker takes. */
export function sendBoard(request: Request, response: Response, board: PackedBoard): void {
  const taken = request.acceptsEncodings('br', 'gzip');
  const coding: BoardCoding = taken === 'br' || taken === 'gzip' ? taken : 'identity';
  response.type('json').vary('Accept-Encoding');
  if (coding !== 'identity') response.set('Content-Encoding', coding);
  response.end(board.body(coding));
}
