import { sentenceOf } from './api-problem';

/** How far what was asked for is: there, still coming, or refused with its sentence. What is there stays while it is renewed. */
export const partState = (
  ...queries: { data: unknown; error: unknown }[]
): 'ready' | 'loading' | { failed: string } => {
  const missing = queries.filter((query) => query.data === undefined);
  if (missing.length === 0) return 'ready';
  const failed = missing.find((query) => query.error);
  return failed ? { failed: sentenceOf(failed.error) } : 'loading';
};
