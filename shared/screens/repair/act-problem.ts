import { actProblem } from '@/shared/client/charge-acts';

/** The sentence of a refused act; null where there is none. */
export const problemOfAct = (error: unknown): string | null => (error ? actProblem(error) : null);
