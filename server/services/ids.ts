import { randomUUID } from 'node:crypto';

/** A new row's id. Made in code, so that it is known before the row is written. */
export const newId = (): string => randomUUID();
