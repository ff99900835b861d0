import { constantPhase } from './constant-phase';
import { AMPS, HELD, Laws } from './laws';
import type { Ending, Run } from './run';
import { variablePhase } from './variable-phase';

export interface RunOutcome {
  ending: Exclude<Ending, { kind: 'switch' }>;
  /** Current at the stop in its own direction, A; 0 where none was needed. */
  amps: number;
  voltageLimitAtS: number | null;
  /** Branch that held the current at the stop, or last before it. */
  heldBranch: number | null;
}

/** Lets the current run from law to law until a stop. */
export function runLoop(run: Run): RunOutcome {
  const { laws, stops } = run;
  let voltageLimitAtS: number | null = null;
  let heldBranch: number | null = null;
  if (stops.atCoulombs <= 0) return { ending: { kind: 'target' }, amps: 0, voltageLimitAtS, heldBranch };

  let law = laws.ruling(run.y);
  for (;;) {
    const raw = laws.amps(law, run.y);
    const amps = run.signed ? raw : Math.max(0, raw);
    run.peakAmps = Math.max(run.peakAmps, Math.abs(amps));
    if (Laws.isVoltageLimit(law)) {
      voltageLimitAtS ??= run.s;
      if (law >= HELD) heldBranch = law - HELD;
    }
    const at = (ending: RunOutcome['ending']): RunOutcome => ({ ending, amps, voltageLimitAtS, heldBranch });
    const limited = run.branchAtLimit(run.y, amps);
    if (limited >= 0) return at({ kind: 'group-limit', branch: limited });
    if (Laws.isVoltageLimit(law) && stops.cutoffAmps > 0 && amps <= stops.cutoffAmps) return at({ kind: 'cutoff' });
    if (run.s >= stops.maxSeconds) return at({ kind: 'time-cap' });

    const constant = law === AMPS || (!run.signed && raw <= 0);
    const ending = constant ? constantPhase(run, law, amps) : variablePhase(run, law);
    if (ending.kind !== 'switch') {
      const last = laws.amps(law, run.y);
      return { ending, amps: run.signed ? last : Math.max(0, last), voltageLimitAtS, heldBranch };
    }
    law = ending.law ?? laws.ruling(run.y);
  }
}
