import { compileCurve } from './curve/compiled-curve';
import { isGiven } from './require';
import { Laws } from './step/laws';
import { Run } from './step/run';
import { runLoop, type RunOutcome } from './step/run-loop';
import { SeriesLoop } from './step/series-loop';
import { settleSeconds } from './step/settle';
import { findLimit, type Limit } from './step/unreachable';
import { validateStep } from './step/validate-step';
import type { StepInput, StepOptions, StepResult } from './types';

/**
 * One step: a current through all groups in series until the first stop, then the rest.
 *
 * Per group V = U(z) + I·R0 + v1, dv1/dt = (I·R1 − v1)/τ, dz/dt = η·I/(3600·Q); the current is the least that the
 * limits allow, at the supply's own terminals. Stretches of constant current are exact; the others are integrated to
 * about 1e-4 of the current. Volts, amperes, ampere-hours, ohms, seconds.
 *
 * A target that lies on the wrong side of the start is met at once (zero seconds), and `reason` says so. Where nothing
 * ends the step, the outcome is 'unreachable': times and ampere-hours are 0, and the voltages are those that the groups
 * would tend to. With a time cap such a step ends at the cap, with the reason.
 *
 * @throws CalcInputError for input that cannot be, and where no stop is given
 */
export function chargeThroughTerminals(input: StepInput, options?: StepOptions): StepResult {
  validateStep(input);
  compileCurve(input.curve);
  const { groups, curve, direction, source, stop } = input;
  const sense = direction === 'charge' ? 1 : -1;
  const efficiency = direction === 'charge' ? input.coulombicEfficiency : 1;
  const loop = new SeriesLoop([{ groups, curve, sense, side: 1, efficiency }]);
  const moduleOhm = loop.totalOhmic + input.linkResistanceOhm;
  const decays = loop.uneven && (isGiven(source.heldGroupVolts) || isGiven(stop.groupVolts));
  const laws = new Laws(
    loop,
    {
      maxAmps: source.maxAmps ?? null,
      maxWatts: source.maxWatts ?? null,
      setVolts: source.setVolts ?? null,
      loadOhm: source.loadOhm ?? null,
      heldVolts: source.heldGroupVolts ?? null,
      totalOhm: moduleOhm + source.leadResistanceOhm,
    },
    decays,
  );

  const limit = findLimit(input, loop);
  const run = new Run(
    loop,
    laws,
    {
      atCoulombs: limit.atCoulombs,
      cutoffAmps: stop.cutoffAmps ?? 0,
      groupVolts: stop.groupVolts ?? null,
      maxSeconds: stop.maxSeconds ?? Infinity,
    },
    moduleOhm,
    false,
    options?.trace ?? false,
  );
  if (limit.neverEnds) return unreachable(input, loop, limit);
  const outcome = runLoop(run);
  if (outcome.ending.kind === 'dead') return unreachable(input, loop, limit, run.y[0]!);
  return report(input, run, limit, outcome);
}

function report(input: StepInput, run: Run, limit: Limit, outcome: RunOutcome): StepResult {
  const { loop } = run;
  const { ending, amps } = outcome;
  const q = run.y[0]!;
  const over = loop.counts.map((_, b) => loop.branchOver(b, run.y, run.s));
  const groups = loop.branchOfGroup.map((b) => ({
    volts: loop.branchVolts(b, q) + loop.sense * (over[b]! + amps * loop.ohmic[b]!),
    soc: loop.socOf(b, q),
    polarisationVolts: loop.sense * over[b]!,
  }));
  const endTerminalVolts = run.moduleVolts(run.y, amps);
  loop.at(q);
  const relaxedVolts = loop.emf;
  const settleS = settleSeconds(
    groups.map((group) => group.polarisationVolts),
    loop.branchOfGroup.map((b) => loop.classTau[loop.classOf[b]!]!),
    input.settledVolts,
  );
  const kind = ending.kind === 'dead' ? 'unreachable' : ending.kind;
  const branch =
    ending.kind === 'group-limit'
      ? ending.branch
      : ending.kind === 'target' && limit.byGroup !== null
        ? limit.byGroup
        : outcome.heldBranch;
  return {
    outcome: kind,
    ...(kind === 'target' || kind === 'time-cap' ? reasonOf(limit, kind) : {}),
    voltageLimitAtS: outcome.voltageLimitAtS,
    stopAtS: run.s,
    settleS,
    totalS: run.s + settleS,
    ampHours: q / 3600,
    wattHours: (loop.energyTo(q) + loop.sense * run.lossWs) / 3600,
    endAmps: amps === 0 ? 0 : loop.sense * amps,
    endTerminalVolts,
    relaxedVolts,
    groups,
    limitingGroup: branch === null ? null : loop.branchOfGroup.indexOf(branch),
    ...(run.trace ? { trace: run.trace } : {}),
  };
}

function reasonOf(limit: Limit, kind: 'target' | 'time-cap'): { reason?: string } {
  const reason = kind === 'target' ? limit.pastReason : limit.unreachableReason;
  return reason === null ? {} : { reason };
}

function unreachable(input: StepInput, loop: SeriesLoop, limit: Limit, atCoulombs?: number): StepResult {
  const q = Number.isFinite(limit.endCoulombs) ? limit.endCoulombs : (atCoulombs ?? 0);
  loop.at(q);
  return {
    outcome: 'unreachable',
    reason: limit.unreachableReason ?? 'The current dies away before any of the stops is reached.',
    voltageLimitAtS: null,
    stopAtS: 0,
    settleS: 0,
    totalS: 0,
    ampHours: 0,
    wattHours: 0,
    endAmps: 0,
    endTerminalVolts: loop.emf,
    relaxedVolts: loop.emf,
    groups: loop.branchOfGroup.map((b) => ({
      volts: loop.branchVolts(b, q),
      soc: loop.socOf(b, q),
      polarisationVolts: 0,
    })),
    limitingGroup: limit.endBranch === null ? null : loop.branchOfGroup.indexOf(limit.endBranch),
  };
}
