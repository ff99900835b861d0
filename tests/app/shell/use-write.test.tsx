import { act, renderHook, waitFor } from '@testing-library/react';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { ApiProblem, OfflineError } from '@/shared/client/api-problem';
import { ClientProvider } from '@/shared/client/client-provider';
import { queryClient } from '@/shared/client/query-client';
import { useWrite } from '@/shared/client/use-write';

beforeEach(() => queryClient.clear());

/** A write whose answers are a script; notes the key of each try. */
function writing(script: (Error | 'ok')[]) {
  const keys: string[] = [];
  const { result } = renderHook(
    () =>
      useWrite({
        send: async (_input: { amps: number }, key: string) => {
          keys.push(key);
          const answer = script.shift();
          if (answer instanceof Error) throw answer;
          return 'done';
        },
        changes: ['board'],
      }),
    { wrapper: ClientProvider },
  );
  const go = (amps: number) =>
    act(async () => void (await result.current.mutateAsync({ amps }).catch(() => undefined)));
  return { keys, go };
}

describe('the key of an act', () => {
  it('stays the same while the same input is tried again after a lost connection or a stumbling server', async () => {
    const { keys, go } = writing([new OfflineError(), new ApiProblem({ status: 503 }), 'ok']);
    await go(10);
    await go(10);
    await go(10);
    expect(new Set(keys).size).toBe(1);
    expect(keys[0]).toMatch(/^[0-9a-f]{32}$/);
  });

  it('is new for another input, after a refusal, and after it was done', async () => {
    const { keys, go } = writing([new OfflineError(), new ApiProblem({ status: 409 }), 'ok', 'ok']);
    await go(10);
    await go(12);
    await go(12);
    await go(12);
    expect(new Set(keys).size).toBe(4);
  });

  it('renews what changes with it', async () => {
    const fetchBoard = vi.fn(async () => 1);
    await queryClient.fetchQuery({ queryKey: ['board'], queryFn: fetchBoard });
    const { go } = writing(['ok']);
    await go(10);
    await waitFor(() => expect(queryClient.getQueryState(['board'])?.isInvalidated).toBe(true));
  });
});
