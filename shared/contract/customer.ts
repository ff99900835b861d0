/** What is kept of a customer: taken out as a file, or erased while the technical record of the repairs stays. */
import * as z from 'zod/mini';
import { reason, type Instant } from './common';
import type { AdvisedOutcome, ModuleFate } from './repair';

export const eraseCustomerSchema = z.object({ reason });
export type EraseCustomerInput = z.infer<typeof eraseCustomerSchema>;

/** Everything that names one customer, and what was done for them. */
export interface CustomerExportDto {
  exportedAt: Instant;
  workshop: string;
  /** Null: it was never told, or is erased. */
  name: string | null;
  contact: string | null;
  /** All repairs of the same name and contact; the last booked first. */
  repairs: {
    number: string;
    vehicle: string;
    bookedAt: Instant;
    promisedAt: Instant | null;
    handedOverAt: Instant | null;
    note: string | null;
    handOverNote: string | null;
    removed: { modulePosition: string; fate: ModuleFate; note: string | null; at: Instant }[];
    advised: {
      text: string;
      outcome: AdvisedOutcome;
      detail: string | null;
      agreedBy: string | null;
      agreedAt: Instant | null;
    }[];
    /** Other work for it. */
    work: { number: string; title: string; note: string | null; addedAt: Instant }[];
    photos: { at: Instant; caption: string | null; address: string }[];
    log: { at: Instant; text: string }[];
  }[];
}
