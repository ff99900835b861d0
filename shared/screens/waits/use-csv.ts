import { sentenceOf } from '@/shared/client/api-problem';
import { useLink } from '@/shared/client/link';
import { useSaveWaits } from '@/shared/client/waits';
import type { WaitsCsvQuery } from '@/shared/contract/waits';

/** The tables of the page as files. Without a connection there is no way to them, and the page says why. */
export function useCsv(query: WaitsCsvQuery) {
  const save = useSaveWaits();
  const down = useLink().state === 'down';
  const problem = down
    ? 'No connection: the tables can be saved as CSV when it is back.'
    : save.isError
      ? `The table could not be saved. ${sentenceOf(save.error)}`
      : null;
  return {
    problem,
    busy: save.isPending,
    down,
    /** What saves one of the tables; undefined without a connection. */
    of: (what: WaitsCsvQuery['what']) => (down ? undefined : () => save.mutate({ ...query, what })),
  };
}
export type Csv = ReturnType<typeof useCsv>;
