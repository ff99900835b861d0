/**
 * The server's clock on this device. Screens count for themselves against it; no ticks are sent.
 *
 * Offset by four time-stamps, the best round trip of five (error at most half of it). More than a second off: set at
 * once; less: slewed at 5 %, so that no countdown jumps or runs backwards.
 */
import { useCallback, useSyncExternalStore } from 'react';
import { recall, remember } from './storage';

/** One question: sent and heard by this device's clock, received and answered by the server's; epoch ms. */
export interface ClockSample {
  sentAt: number;
  receivedAt: number;
  answeredAt: number;
  heardAt: number;
}

const stepMs = 1000;
const slewRate = 0.05;
/** A Date header has whole seconds; nothing closer is corrected by it. */
const roughMs = 2500;

/** Server minus device, ms, by the sample with the shortest round trip; null without a sample. */
export function offsetOf(samples: readonly ClockSample[]): { offsetMs: number; roundTripMs: number } | null {
  let best: { offsetMs: number; roundTripMs: number } | null = null;
  for (const s of samples) {
    const roundTripMs = s.heardAt - s.sentAt - (s.answeredAt - s.receivedAt);
    // A negative trip: the device's clock was set in between.
    if (roundTripMs < 0 || (best && roundTripMs >= best.roundTripMs)) continue;
    best = { offsetMs: (s.receivedAt - s.sentAt + (s.answeredAt - s.heardAt)) / 2, roundTripMs };
  }
  return best;
}

/** What the device's clock may differ from the steady one between two looks without having been set, ms. */
const wanderMs = 2000;
/** Set back by more, the device had no idea of the day: what was measured against it says nothing, ms. */
const mostBackMs = 86_400_000;

/**
 * @param steadyNow a clock that nobody sets, such as `performance.now`; it may stand still while the device sleeps. Left
 *   out: a device's clock that is set back takes the server's time with it until it is measured again
 */
export function makeClock(deviceNow: () => number, steadyNow?: () => number) {
  let from = 0;
  let to = 0;
  let since = deviceNow();
  let synced = false;
  let lead = steadyNow ? deviceNow() - steadyNow() : 0;
  const listeners = new Set<() => void>();
  const measures = new Set<() => void>();

  /** The device's time. Set back by a person, it is met by as much more offset; ahead may be sleep, and is left. */
  const device = (): number => {
    const now = deviceNow();
    if (!steadyNow) return now;
    const present = now - steadyNow();
    const back = lead - present;
    lead = present;
    if (back > wanderMs && back < mostBackMs) {
      from += back;
      to += back;
      since -= back;
    }
    return now;
  };

  const offsetAt = (device: number): number => {
    const gone = Math.max(0, device - since) * slewRate;
    const left = to - from;
    return Math.abs(left) <= gone ? to : from + Math.sign(left) * gone;
  };
  const step = (offset: number): void => {
    from = to = offset;
    listeners.forEach((listener) => listener());
  };

  return {
    /** The server's time, epoch ms. */
    now: (): number => {
      const at = device();
      return at + offsetAt(at);
    },
    /** Server minus device, ms. */
    offset: (): number => offsetAt(device()),
    /** Takes a measured offset. */
    correct: (offsetMs: number): void => {
      const now = device();
      const at = offsetAt(now);
      if (!synced || Math.abs(offsetMs - at) > stepMs) step(offsetMs);
      else [from, to] = [at, offsetMs];
      since = now;
      synced = true;
      measures.forEach((listener) => listener());
    },
    /** Takes the offset that was measured before the page was closed, until something better is known. */
    recall: (offsetMs: number): void => {
      if (!synced) step(offsetMs);
    },
    /** Takes the Date header of an answer, until the clock is measured: a device a day off is right at first sight. */
    rough: (serverDate: number): void => {
      if (synced) return;
      const offset = serverDate + 500 - device();
      if (Math.abs(offset - to) > roughMs) step(offset);
    },
    /** Hears of steps, not of ticks. */
    onStep: (listener: () => void) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    /** Hears of every measurement. */
    onMeasured: (listener: () => void) => {
      measures.add(listener);
      return () => measures.delete(listener);
    },
  };
}

export const serverClock = makeClock(
  () => Date.now(),
  () => performance.now(),
);

// A page that opens without a connection counts by what was last measured: the phone's clock is as wrong as it was.
const offsetKey = 'clock-offset';
const recalled = Number(recall(offsetKey) ?? Number.NaN);
if (Number.isFinite(recalled)) serverClock.recall(recalled);
serverClock.onMeasured(() => remember(offsetKey, String(Math.round(serverClock.offset()))));

/** The server's time now, epoch ms. For handlers; components use `useNow`. */
export const serverNow = (): number => serverClock.now();
/** An instant of this device's clock (TanStack's `dataUpdatedAt`) on the server's, epoch ms. */
export const serverTimeOf = (deviceInstant: number): number => deviceInstant + serverNow() - Date.now();

interface Ticker {
  get: () => number;
  subscribe: (changed: () => void) => () => void;
}
const tickers = new Map<number, Ticker>();

/** One timer per interval for all components, on the full interval of the server's clock. */
function tickerOf(everyMs: number): Ticker {
  const known = tickers.get(everyMs);
  if (known) return known;
  let value = serverNow();
  let timer: ReturnType<typeof setTimeout> | undefined;
  const listeners = new Set<() => void>();
  const tick = () => {
    clearTimeout(timer);
    value = serverNow();
    timer = setTimeout(tick, everyMs - (value % everyMs) + 5);
    for (const listener of [...listeners]) listener();
  };
  const wake = () => {
    if (document.visibilityState === 'visible') tick();
  };
  let quit: (() => void) | undefined;
  const ticker: Ticker = {
    get: () => {
      // Between two uses nothing ticks: an old value is replaced before it is shown.
      if (listeners.size === 0 && Math.abs(serverNow() - value) >= everyMs) value = serverNow();
      return value;
    },
    subscribe: (changed) => {
      listeners.add(changed);
      if (listeners.size === 1) {
        const offStep = serverClock.onStep(tick);
        document.addEventListener('visibilitychange', wake);
        quit = () => {
          offStep();
          document.removeEventListener('visibilitychange', wake);
        };
        timer = setTimeout(tick, everyMs - (serverNow() % everyMs) + 5);
      }
      return () => {
        listeners.delete(changed);
        if (listeners.size > 0) return;
        clearTimeout(timer);
        quit?.();
      };
    },
  };
  tickers.set(everyMs, ticker);
  return ticker;
}

/** The server's time, epoch ms, renewed on every full interval: `useNow(1000)` for seconds, `useNow(60_000)` for a clock. */
export function useNow(everyMs = 1000): number {
  const ticker = tickerOf(everyMs);
  return useSyncExternalStore(
    useCallback((changed: () => void) => ticker.subscribe(changed), [ticker]),
    ticker.get,
    ticker.get,
  );
}
