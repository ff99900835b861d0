/** Where the process stands between its start and its end. Made once in index.ts; tests make their own. */
export interface Lifecycle {
  /** False before everything is up, and again from the first signal to stop. */
  ready: boolean;
  /** When the process began, epoch ms. */
  startedAt: number;
}
