import type { Response } from 'express';
import type { Paper } from '../papers/page';

/** Sends a PDF as a file. No cache keeps it: it holds a customer's name. */
export function sendPaper(response: Response, { name, bytes }: Paper): void {
  response
    .set({
      'content-disposition': `attachment; filename="${name.replace(/[^\w.-]/g, '_')}"`,
      'cache-control': 'private, no-store',
    })
    .type('application/pdf')
    .send(bytes);
}
