/** One look through repairs, spares and charges. */
import * as z from 'zod/mini';
import type { Stage } from './charge';
import type { Instant } from './common';
import type { RepairState } from './repair';
import type { SpareWhere } from './spare';

export const searchQuerySchema = z.object({
  q: z
    .string('Say what to look for.')
    .check(z.trim(), z.minLength(1, 'Say what to look for.'), z.maxLength(60, 'This is too long to look for.')),
});
export type SearchQuery = z.infer<typeof searchQuerySchema>;

/** What was found says what it is; its id leads to its page. */
export type SearchHitDto =
  | {
      kind: 'repair';
      id: string;
      number: string;
      vehicle: string;
      bay: string | null;
      customerName: string | null;
      state: RepairState;
    }
  | { kind: 'spare'; id: string; label: string; typeName: string; shelfPlace: string | null; where: SpareWhere }
  | { kind: 'charge'; id: string; title: string; number: string; spareLabel: string; stage: Stage; at: Instant };

export interface SearchDto {
  /** Repairs, then spares, then charges; of each what fits best first. */
  hits: SearchHitDto[];
  /** There is more than is shown: a longer search finds it. */
  more: boolean;
}
