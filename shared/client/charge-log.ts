import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import type { LogChoices, LogPreviewDto, LogTakenDto } from '@/shared/contract/charge-log';
import { api } from './api';
import { isProblem } from './api-problem';
import { storeCharge } from './charges';
import { roots } from './query-keys';

export interface LogFile {
  name: string;
  file: Blob;
}

const send = <T>(
  part: 'log-preview' | 'log-file',
  id: string,
  { name, file }: LogFile,
  choices: LogChoices | null,
  more: { onSent: (share: number) => void; signal?: AbortSignal },
): Promise<T> =>
  api.upload<T>(`/charges/${id}/${part}`, file, {
    query: { name: name.slice(0, 200), choices: choices === null ? null : JSON.stringify(choices) },
    ...more,
  });

/** A server may still be at the file that was broken off a moment ago: it takes one of a person at a time. */
const TRIES = 20;
const PAUSE_MS = 500;

async function onceFree<T>(ask: () => Promise<T>, signal: AbortSignal): Promise<T> {
  for (let tries = 1; ; tries += 1)
    try {
      return await ask();
    } catch (error) {
      const busy = isProblem(error) && error.code === 'upload_under_way';
      if (!busy || tries === TRIES || signal.aborted) throw error;
      await new Promise((resolve) => setTimeout(resolve, PAUSE_MS));
    }
}

/** Where the reading of a file is. */
export interface LogReading {
  log: LogFile | null;
  /** The last answer; it stays while another is on its way. */
  preview: LogPreviewDto | null;
  /** What is chosen, ahead of the answer. */
  choices: LogChoices | null;
  /** Share of the file that has gone out; null: nothing is on its way. */
  sent: number | null;
  error: unknown;
}

const none: LogReading = { log: null, preview: null, choices: null, sent: null, error: null };

/** A file of readings: what the server understands of it, anew with every choice, and the taking of it. */
export function useChargeLog(id: string) {
  const client = useQueryClient();
  const [state, setState] = useState(none);
  const running = useRef<AbortController | null>(null);
  useEffect(() => () => running.current?.abort(), []);

  const read = useCallback(
    async (log: LogFile, choices: LogChoices | null) => {
      running.current?.abort();
      const mine = new AbortController();
      running.current = mine;
      const current = (change: Partial<LogReading>) =>
        running.current === mine && setState((before) => ({ ...before, ...change }));
      setState((before) => ({
        ...before,
        log,
        choices,
        preview: before.log === log ? before.preview : null,
        sent: 0,
        error: null,
      }));
      try {
        const onSent = (sent: number) => current({ sent });
        const ask = () => send<LogPreviewDto>('log-preview', id, log, choices, { onSent, signal: mine.signal });
        const preview = await onceFree(ask, mine.signal);
        current({ preview, choices: preview.choices, sent: null });
      } catch (error) {
        if (!mine.signal.aborted) current({ sent: null, error });
      }
    },
    [id],
  );

  /** Gives what was taken, or null where it was refused: why stands in `error`. */
  const take = async (): Promise<LogTakenDto | null> => {
    const { log, choices } = state;
    if (log === null || choices === null) return null;
    setState((before) => ({ ...before, sent: 0, error: null }));
    try {
      const onSent = (sent: number) => setState((before) => ({ ...before, sent }));
      const taken = await send<LogTakenDto>('log-file', id, log, choices, { onSent });
      storeCharge(client, taken.charge);
      for (const root of [roots.charges, roots.board, roots.alerts])
        void client.invalidateQueries({ queryKey: [root] });
      return taken;
    } catch (error) {
      setState((before) => ({ ...before, sent: null, error }));
      return null;
    }
  };
  return { ...state, read, take };
}
