/** What is printed. */
import * as z from 'zod/mini';

/** How a paper is asked for: its size, and the decimal mark of the device that asks. */
export const paperQuerySchema = z.object({
  paper: z.optional(z.enum(['a4', 'letter'])),
  decimal: z.optional(z.enum(['point', 'comma'])),
});
export type PaperQuery = z.infer<typeof paperQuerySchema>;
