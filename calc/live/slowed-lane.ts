import type { Lane } from './lane';

/**
 * A lane whose charges have taken `factor` times as long as reckoned: the model goes through the same states, later. What
 * readings say has flowed stays as they say it.
 */
export function slowedLane(lane: Lane, factor: number): Lane {
  if (factor === 1) return lane;
  return {
    ...lane,
    forward: (state, drive, maxSeconds, onwards) => {
      const run = lane.forward(state, drive, maxSeconds === null ? null : maxSeconds / factor, onwards);
      const seconds = run.seconds * factor;
      return {
        ...run,
        seconds,
        taperAfterS: run.taperAfterS === null ? null : run.taperAfterS * factor,
        state: { ...run.state, s: state.s + seconds },
      };
    },
  };
}
