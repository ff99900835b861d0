import { offsetOf, type ClockSample } from './clock';

/** Asks the server once; rejects when no answer comes. */
export type AskClock = () => Promise<ClockSample>;

const every = 5 * 60_000;
const samples = 5;
const pauseMs = 150;

/** Five questions, one after the other; those without an answer are left out. */
export async function measureOffset(
  ask: AskClock,
  pause: (ms: number) => Promise<void> = (ms) => new Promise((resolve) => setTimeout(resolve, ms)),
) {
  const heard: ClockSample[] = [];
  for (let i = 0; i < samples; i++) {
    try {
      heard.push(await ask());
    } catch {
      continue;
    }
    if (i < samples - 1) await pause(pauseMs);
  }
  return offsetOf(heard);
}

/**
 * Keeps a clock measured: now, every 5 min, when the page is shown again and when the device's clock was set.
 * @returns stops it
 */
export function keepClock(ask: AskClock, correct: (offsetMs: number) => void): () => void {
  let stopped = false;
  let running = false;
  let again = false;
  const run = async (): Promise<void> => {
    if (running) {
      again = true;
      return;
    }
    running = true;
    try {
      do {
        again = false;
        const measured = await measureOffset(ask);
        if (measured && !stopped) correct(measured.offsetMs);
      } while (again && !stopped);
    } finally {
      running = false;
    }
  };
  const shown = () => {
    if (document.visibilityState === 'visible') void run();
  };
  // The wall's clock jumps while the monotonic one does not: somebody set the device's time.
  let lead = Date.now() - performance.now();
  const watch = setInterval(() => {
    const present = Date.now() - performance.now();
    if (Math.abs(present - lead) > 2000) void run();
    lead = present;
  }, 5000);
  const timer = setInterval(() => void run(), every);
  document.addEventListener('visibilitychange', shown);
  void run();
  return () => {
    stopped = true;
    clearInterval(timer);
    clearInterval(watch);
    document.removeEventListener('visibilitychange', shown);
  };
}
