/** The weekly digest of the waits, by e-mail to managers. */
import * as z from 'zod/mini';

export interface WeeklyDigestDto {
  /** It comes to who asks, while they are a manager. */
  on: boolean;
  eMail: {
    /** Where letters go. */
    address: string;
    /** The server can send letters. */
    on: boolean;
  };
}

export const changeWeeklyDigestSchema = z.object({ on: z.boolean() });
export type ChangeWeeklyDigestInput = z.infer<typeof changeWeeklyDigestSchema>;

export const digestStopSchema = z.object({
  token: z.string().check(z.maxLength(200, 'This link is none of ours.')),
});
