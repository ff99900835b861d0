/** What a job and its thread share while it runs: how far it is, and whether it is to stop. */
const PROGRESS = 0;
const STOP = 1;
const BEGUN = 2;
const FINE = 1000;

export interface JobControl {
  /** Share that is done, 0…1. */
  tell: (share: number) => void;
  begin: () => void;
  stop: () => void;
  isStopped: () => boolean;
  isBegun: () => boolean;
  progress: () => number;
}

/** Memory that both sides see. */
export const newControl = (): SharedArrayBuffer => new SharedArrayBuffer(3 * Int32Array.BYTES_PER_ELEMENT);

export function jobControl(shared: SharedArrayBuffer): JobControl {
  const cells = new Int32Array(shared);
  return {
    tell: (share) => void Atomics.store(cells, PROGRESS, Math.round(share * FINE)),
    begin: () => void Atomics.store(cells, BEGUN, 1),
    stop: () => void Atomics.store(cells, STOP, 1),
    isStopped: () => Atomics.load(cells, STOP) === 1,
    isBegun: () => Atomics.load(cells, BEGUN) === 1,
    progress: () => Atomics.load(cells, PROGRESS) / FINE,
  };
}
