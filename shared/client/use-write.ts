import { useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { useRef } from 'react';
import { newKey } from './api';
import { isProblem } from './api-problem';
import type { Root } from './query-keys';

export interface WriteOptions<Input, Output> {
  send: (input: Input, idempotencyKey: string) => Promise<Output>;
  /** Resources that change with it. */
  changes?: readonly Root[];
  /** Puts the answer where it belongs before the resources are asked for again. */
  store?: (client: QueryClient, output: Output, input: Input) => void;
}

/**
 * A write. The idempotency key stays the same while the same input is tried again after a lost connection or a
 * stumbling server, so that nothing happens twice; a new input, or an answer, ends it.
 */
export function useWrite<Input = void, Output = void>({ send, changes = [], store }: WriteOptions<Input, Output>) {
  const client = useQueryClient();
  const attempt = useRef<{ input: string; key: string } | null>(null);
  return useMutation<Output, Error, Input>({
    mutationFn: async (input) => {
      const text = JSON.stringify(input) ?? '';
      if (attempt.current?.input !== text) attempt.current = { input: text, key: newKey() };
      try {
        const output = await send(input, attempt.current.key);
        attempt.current = null;
        return output;
      } catch (error) {
        if (isProblem(error) && error.status < 500) attempt.current = null;
        throw error;
      }
    },
    onSuccess: (output, input) => {
      store?.(client, output, input);
      // Not awaited: the act is done, the lists follow.
      for (const root of changes) void client.invalidateQueries({ queryKey: [root] });
    },
  });
}
