import { Laws } from './laws';
import type { Ending, Run } from './run';

/** Two laws agree within this share of the current. */
const SWITCH_TOLERANCE = 1e-9;

/** Something that ends or changes a stretch, as a value that is negative until then. */
export interface Watch {
  value: (y: number[], amps: number) => number;
  ending: Ending;
}

/** All that can end or change a stretch under `law`. */
export function watchesOf(run: Run, law: number): Watch[] {
  const { laws, loop, stops } = run;
  const watches: Watch[] = [];
  if (Number.isFinite(stops.atCoulombs))
    watches.push({ value: (y) => y[0]! - stops.atCoulombs, ending: { kind: 'target' } });
  if (stops.cutoffAmps > 0 && Laws.isVoltageLimit(law))
    watches.push({ value: (_, amps) => stops.cutoffAmps - amps, ending: { kind: 'cutoff' } });
  const level = run.groupLevel;
  if (level !== null)
    for (let b = 0; b < loop.branchCount; b++)
      watches.push({
        value: (y, amps) => laws.branchTerminal(b, y, amps) - level,
        ending: { kind: 'group-limit', branch: b },
      });
  if (laws.kinds.length > 1)
    watches.push({
      value: (y, amps) => amps - laws.leastOther(law, y) - SWITCH_TOLERANCE * Math.abs(amps),
      ending: { kind: 'switch', law: null },
    });
  if (!run.signed) watches.push({ value: (_, amps) => -amps - 1e-12, ending: { kind: 'switch', law: null } });
  return watches;
}
