/** The one clock of the process. Below the routes time is an argument; tests pass a clock they move by hand. */
export interface Clock {
  /** Epoch milliseconds. */
  now(): number;
}

export const systemClock: Clock = { now: () => Date.now() };
