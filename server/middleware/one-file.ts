import type { Request, Response } from 'express';
import multer from 'multer';
import { DomainError } from '../errors/domain-error';

export interface FileRule {
  /** Name of the part that holds it. */
  field: string;
  mostBytes: number;
}

const tooLarge = ({ field, mostBytes }: FileRule): DomainError => {
  const message = `This file is larger than ${Math.round(mostBytes / 1024 / 1024)} MB. Send a smaller one.`;
  return new DomainError(413, 'too_large', message, { fields: { [field]: message } });
};

const missing = ({ field }: FileRule): DomainError => {
  const message = 'No file came along. Choose one and send it again.';
  return new DomainError(400, 'invalid', message, { fields: { [field]: message } });
};

/**
 * The one file of a request, in memory. Read only after the asker was let in, and never more of it than the rule says.
 * @throws DomainError 400 where none came, 413 for one that is too large
 */
export async function oneFile(request: Request, response: Response, rule: FileRule): Promise<Buffer> {
  const { field, mostBytes } = rule;
  // What is announced as too large is not taken into memory at all, nor waited for.
  if (Number(request.get('content-length') ?? 0) > mostBytes + 64 * 1024) throw tooLarge(rule);
  const limits = { fileSize: mostBytes, files: 1, fields: 0, parts: 2 };
  const take = multer({ storage: multer.memoryStorage(), limits }).single(field);
  await new Promise<void>((resolve, reject) => {
    take(request, response, (error: unknown) => {
      if (error === undefined || error === null) resolve();
      else if (error instanceof multer.MulterError && error.code === 'LIMIT_FILE_SIZE') reject(tooLarge(rule));
      else if (error instanceof multer.MulterError) {
        const message = 'Send one file in a request, and nothing else.';
        reject(new DomainError(400, 'invalid', message, { fields: { [field]: message } }));
      } else reject(new DomainError(400, 'invalid', 'The upload broke off. Send it again.'));
    });
  });
  if (!request.file) throw missing(rule);
  return request.file.buffer;
}
