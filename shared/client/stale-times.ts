/** How old an answer may be before it is asked for again on the next look, ms. The socket says sooner when it changed. */
export const staleTimes = {
  /** Charges, board, alerts: what is running. */
  running: 15_000,
  /** Spares and their readings. */
  stock: 60_000,
  /** Chargers, module types, meters, people, settings. */
  setUp: 5 * 60_000,
  session: 5 * 60_000,
  statistics: 2 * 60_000,
} as const;
