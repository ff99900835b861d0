import type { Deps } from '../deps';

/** Fills an empty database with the demo workshop. */
export type SeedDemo = (deps: Deps) => Promise<void>;

// Filled by the demo's own files.
export const seedDemo: SeedDemo = async (deps) => {
  deps.log.warn('this build has no demo workshop');
};
