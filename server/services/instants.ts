import type { Instant } from '@/shared/contract/common';

/** Epoch milliseconds as the ISO string of the wire. */
export const toInstant = (ms: number): Instant => new Date(ms).toISOString();

/** As `toInstant`; what is not there stays null. */
export const toOptionalInstant = (ms: number | null): Instant | null => (ms === null ? null : toInstant(ms));

/** An ISO string of the wire (checked by its schema) as epoch milliseconds. */
export const fromInstant = (instant: Instant): number => Date.parse(instant);
