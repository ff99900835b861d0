import type { Request, RequestHandler } from 'express';
import type { Socket } from 'node:net';

/** How long nothing may come of what is left of a request that is answered, ms. */
const IDLE_MS = 2000;
/** How long it may take altogether, ms. */
const MOST_MS = 30_000;
/** How much of it is read and thrown away. */
const MOST_BYTES = 64 * 1024 * 1024;

/**
 * Ends the connection of a request that was answered before all of it was there. At once would reset it, and the asker
 * who is still sending would see a broken line instead of the answer (RFC 9112, 9.6): what comes is read and thrown
 * away for a while. Who sends all of it keeps the connection; who dawdles or sends without end loses it.
 */
function linger(request: Request, socket: Socket): void {
  const first = socket.bytesRead;
  const until = Date.now() + MOST_MS;
  let heard = first;
  const look = setInterval(() => {
    const idle = socket.bytesRead === heard;
    heard = socket.bytesRead;
    if (request.complete || socket.destroyed) clearInterval(look);
    else if (idle || heard - first > MOST_BYTES || Date.now() > until) {
      clearInterval(look);
      socket.destroy();
    }
  }, IDLE_MS);
  look.unref();
}

/** Keeps no connection open for the rest of a request that is answered already. */
export const closeUnread: RequestHandler = (request, response, next) => {
  // A request that broke off has no socket any more when its answer is written.
  const { socket } = request;
  response.once('finish', () => {
    if (!request.complete && !socket.destroyed) linger(request, socket);
  });
  next();
};
