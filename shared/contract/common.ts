import * as z from 'zod/mini';

/** Ids are made by the server; 1–64 of a safe alphabet. */
export const id = z.string().check(z.regex(/^[A-Za-z0-9_-]{1,64}$/, 'This id is not one of ours.'));

/** Text that must not be empty. */
export const text = (name: string, max = 120) =>
  z
    .string()
    .check(
      z.trim(),
      z.minLength(1, `${name} is missing.`),
      z.maxLength(max, `${name} is longer than ${max} characters. Shorten it.`),
    );

/** Text that may be empty; empty becomes null. */
export const optionalText = (name: string, max = 500) =>
  z.pipe(
    z.transform((raw: unknown): unknown =>
      raw === undefined || (typeof raw === 'string' && raw.trim() === '') ? null : raw,
    ),
    z.nullable(z.string().check(z.trim(), z.maxLength(max, `${name} is longer than ${max} characters. Shorten it.`))),
  );

/** An instant on the wire: ISO 8601 with its offset. */
export const instant = z
  .string()
  .check(
    z.refine(
      (value) => /^\d{4}-\d\d-\d\dT\d\d:\d\d/.test(value) && Number.isFinite(Date.parse(value)),
      'This is no time. Type it like 14:05.',
    ),
  );

export const optionalInstant = z.pipe(
  z.transform((raw: unknown): unknown => (raw === undefined || raw === '' ? null : raw)),
  z.nullable(instant),
);

/** A calendar day of the workshop: '2026-06-09'. */
export const day = z.string().check(z.regex(/^\d{4}-\d\d-\d\d$/, 'Type the day like 2026-06-09.'));

/** A reason people must give. */
export const reason = text('The reason', 300);

/** ISO instant string. */
export type Instant = string;

/** RFC 9457 problem details with our own `code` and, for invalid input, the sentence per field. */
export interface ProblemDto {
  type: string;
  title: string;
  status: number;
  detail: string;
  code: string;
  requestId?: string;
  /** Field path ('groupVolts.1') → sentence. */
  fields?: Record<string, string>;
  /** The present state of what somebody else has changed (412) or taken (409). */
  present?: unknown;
  /** Who made it so and when, where the rows tell (412, 409). */
  changed?: ChangedDto;
}

/** Somebody's change that came before one's own. */
export interface ChangedDto {
  /** Null: the clock's doing. */
  by: PersonRef | null;
  at: Instant;
  /** What they did, after their name: 'held it'. */
  did: string;
}

export interface PersonRef {
  id: string;
  name: string;
}
