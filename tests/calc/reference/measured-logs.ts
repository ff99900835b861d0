import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import {
  chargeThroughTerminals,
  planCharge,
  quantile,
  reckonCharge,
  type ChemistryId,
  type PlanInput,
  type StepStop,
} from '@/calc/index';
import { DEFAULT_SPREADS } from '@/calc/plan/default-spreads';
import { planModel, type PlanModel } from '@/calc/plan/plan-model';
import type { Sample } from '@/calc/plan/samples';
import { socOf } from '@/calc/plan/soc-of';
import { shiftCurve, voltsAtSoc } from '@/calc/curve/ocv';
import { splitLongResistance } from '@/calc/resistance/long-resistance';
import { reckonInput } from '../live-fixtures';
import { channel, lmoModule, lmoSpare, planInput, target } from '../plan-fixtures';
import { stepOf } from './modules';

/** The folder of the measured logs stands beside the project; another place can be named. The logs are never copied. */
export const LOG_FOLDER =
  process.env['MEASURED_LOGS'] ?? path.resolve(import.meta.dirname, '..', '..', '..', '..', 'shared', 'data');
export const logsThere = existsSync(path.join(LOG_FOLDER, 'index.json'));

/** What is known of a log before it is looked at: the tester's settings and the published tables. */
export interface LogCase {
  file: string;
  chemistry: ChemistryId;
  capacityAh: number;
  amps: number;
  setVolts: number;
  /** Current that ends the charge. Where the tester held a time instead: one that the plan standing in for it may end at. */
  cutoffAmps: number;
  /** The tester held the set voltage for so long, s; null: until the cut-off. */
  holdS: number | null;
  /** A 10 s pulse of the published table, ohm; null: the chemistry's guess. */
  pulseOhm: number | null;
  /** Of the published pulses; null: the chemistry's guess. */
  timeConstantS: number | null;
  celsius: number;
  /** Of the plan that stands in for the log, wide enough that the cut-off current ends it, V. */
  toleranceVolts: number;
}

export interface LogRow {
  s: number;
  volts: number;
  amps: number;
  phase: string;
}

export function readLog(file: string): LogRow[] {
  const [head, ...lines] = readFileSync(path.join(LOG_FOLDER, file), 'utf8').trim().split('\n');
  const names = head!.split(',');
  const at = (name: string): number => names.indexOf(name);
  return lines.map((line) => {
    const cells = line.split(',');
    return {
      s: Number(cells[at('time_s')]),
      volts: Number(cells[at('voltage_V')]),
      amps: Number(cells[at('current_A')]),
      phase: cells[at('phase')]!.trim(),
    };
  });
}

/** One log from its first reading above the curve's lowest point, in seconds since then. */
export interface MeasuredCharge {
  firstVolts: number;
  /** From the start of current to that reading, s. */
  afterS: number;
  /** Until the current begins to fall, by its own fall (`fallBeginS`). */
  constantS: number;
  totalS: number;
  taperS: number;
  /** The same two with the taper counted from the first row of less current, which comes up to a row late. */
  byRow: { constantS: number; taperS: number };
  ampHours: number;
  rows: LogRow[];
}

/**
 * When the current began to fall. Rows are up to a minute apart, so that the first one below the constant current comes up to a
 * minute late: the exponential through it and the next row, both under constant voltage, is taken back to where it meets the
 * constant current, and never before the last row of full current.
 *
 * @param at the first row of less current
 */
function fallBeginS(rows: readonly LogRow[], at: number, amps: number): number {
  const [before, first, second] = [rows[at - 1], rows[at]!, rows[at + 1]];
  if (before === undefined || second === undefined || !(second.amps < first.amps && first.amps < amps)) return first.s;
  const perSecond = Math.log(first.amps / second.amps) / (second.s - first.s);
  return Math.max(before.s, first.s - Math.log(amps / first.amps) / perSecond);
}

export function measuredCharge(log: LogCase, lowestVolts: number): MeasuredCharge {
  const charge = readLog(log.file).filter((row) => row.phase === 'charge');
  const first = charge.findIndex((row) => row.volts > lowestVolts);
  const rows = charge.slice(first).map((row) => ({ ...row, s: row.s - charge[first]!.s }));
  // Constant current is over with the first row that is below the set value for good, as in the logs' own index.
  let last = rows.length - 1;
  while (last > 0 && rows[last - 1]!.amps < log.amps * 0.99) last -= 1;
  const end = log.holdS === null ? rows.findIndex((row, at) => at > last && row.amps <= log.cutoffAmps) : -1;
  const stop = end < 0 ? rows.length - 1 : end;
  const constantS = fallBeginS(rows, last, log.amps);
  const ampHours = rows
    .slice(1, stop + 1)
    .reduce((sum, row, at) => sum + ((row.amps + rows[at]!.amps) / 2) * ((row.s - rows[at]!.s) / 3600), 0);
  return {
    firstVolts: charge[first]!.volts,
    afterS: charge[first]!.s,
    constantS,
    totalS: rows[stop]!.s,
    taperS: rows[stop]!.s - constantS,
    byRow: { constantS: rows[last]!.s, taperS: rows[stop]!.s - rows[last]!.s },
    ampHours,
    rows: rows.slice(0, stop + 1),
  };
}

/** The log's charge as a plan: on the mark, ended by the least current of the channel. */
export function logPlanInput(log: LogCase, restVolts: number, samples: number): PlanInput {
  return planInput({
    module: {
      ...lmoModule,
      chemistry: log.chemistry,
      groupsInSeries: 1,
      cellsInParallel: 1,
      ratedAh: log.capacityAh,
      chargeLimitVolts: log.setVolts,
      dischargeLimitVolts: 2,
      floorVolts: 1.9,
      maxChargeAmps: log.amps,
      resistanceOhm: log.pulseOhm,
      resistanceKind: 'pulse-10s',
      polarisationTimeConstantS: log.timeConstantS,
    },
    spare: { ...lmoSpare, groupVolts: [restVolts], capacityAh: log.capacityAh, celsius: log.celsius, meterId: 'm1' },
    target: { ...target, volts: log.setVolts, toleranceVolts: log.toleranceVolts, meterId: 'm2', celsius: log.celsius },
    channels: [
      channel('A1', {
        maxAmps: log.amps,
        minAmps: log.cutoffAmps,
        maxVolts: 5,
        offsetSdVolts: DEFAULT_SPREADS.chargerVolts,
      }),
    ],
    celsius: log.celsius,
    samples,
    seed: 7,
  });
}

export interface Prediction {
  constantS: number;
  taperS: number;
  totalS: number;
  ampHours: number;
  /** Sorted, of the samples. */
  totals: number[];
}

/**
 * The charge from the first reading to the cut-off by the core: nominal, and once for each sample of the plan's spreads as
 * committed. Each sample takes its own rest voltage from the reading: less its own drop, with the over-voltage as far built
 * up as the time since the start of current allows.
 */
export function predict(log: LogCase, firstVolts: number, afterS: number, samples = 400): Prediction {
  const model = planModel(logPlanInput(log, firstVolts, samples));
  const nominal = runSample(log, model, model.nominal, firstVolts, afterS);
  const totals = model.samples().map((sample) => runSample(log, model, sample, firstVolts, afterS).totalS);
  return { ...nominal, totals: totals.sort((a, b) => a - b) };
}

function runSample(log: LogCase, model: PlanModel, sample: Sample, firstVolts: number, afterS: number) {
  const { polarisationTimeConstantS: tau } = model.groups[0]!;
  const { ohmicResistanceOhm, polarisationResistanceOhm } = splitLongResistance(sample.longOhm[0]!);
  const amps = log.amps * sample.currentFactor;
  const over = amps * polarisationResistanceOhm * (1 - Math.exp(-afterS / tau));
  const curve = shiftCurve(model.curve, -sample.curveShiftVolts);
  const rest = firstVolts + sample.spareShiftVolts - sample.curveShiftVolts - amps * ohmicResistanceOhm - over;
  const run = (stop: Partial<StepStop>) =>
    chargeThroughTerminals(
      stepOf(
        [
          {
            capacityAh: sample.capacityAh[0]!,
            ohmicResistanceOhm,
            polarisationResistanceOhm,
            polarisationTimeConstantS: tau,
            restVolts: voltsAtSoc(curve, socOf(curve, rest)),
            polarisationVolts: over,
          },
        ],
        curve,
        { maxAmps: amps, setVolts: log.setVolts + DEFAULT_SPREADS.chargerVolts * sample.chargerDraw },
        stop,
      ),
    );
  const first = run({ cutoffAmps: log.cutoffAmps });
  const result = log.holdS === null ? first : run({ maxSeconds: (first.voltageLimitAtS ?? first.stopAtS) + log.holdS });
  return {
    constantS: result.voltageLimitAtS ?? result.stopAtS,
    taperS: result.stopAtS - (result.voltageLimitAtS ?? result.stopAtS),
    totalS: result.stopAtS,
    ampHours: result.ampHours,
  };
}

export interface Replay {
  /** Of the whole charge, seconds from the first reading. */
  totalS: number;
  p10: number;
  p90: number;
}

/**
 * The log as readings of a running charge until `nowS`, from its plan on the mark to the cut-off: when it says the current
 * will end, and the band of that. The clip-on is the first reading; at most `most` readings, evenly over the time, as a
 * logger that is read seldom gives them.
 */
export function replay(log: LogCase, measured: MeasuredCharge, nowS: number, seed = 7, most = 30): Replay {
  const { firstVolts, afterS, rows } = measured;
  const model = planModel(logPlanInput(log, firstVolts, 1));
  const { ohmicResistanceOhm, polarisationResistanceOhm, polarisationTimeConstantS: tau } = model.groups[0]!;
  const over = log.amps * polarisationResistanceOhm * (1 - Math.exp(-afterS / tau));
  const plan = { ...logPlanInput(log, firstVolts - log.amps * ohmicResistanceOhm - over, 256), seed };
  const option = planCharge(plan).options.find((one) => one.finish === 'on-the-mark' && one.way === 'terminals')!;
  const past = rows.filter((row) => row.s <= nowS);
  const every = Math.max(1, Math.floor(past.length / most));
  const reckoning = reckonCharge(
    reckonInput(plan, option, {
      nowS,
      readings: past
        .filter((_, at) => at > 0 && at % every === 0)
        .map((row) => ({ s: row.s, terminalVolts: row.volts, amps: row.amps, celsius: log.celsius, groupVolts: null })),
    }),
  );
  const totalS = log.holdS === null ? reckoning.currentEndS : reckoning.taperAtS! + log.holdS;
  const restAndCheckS = reckoning.restEndS - totalS + plan.workshop.checkS;
  return {
    totalS,
    p10: reckoning.readyS.p10 - restAndCheckS,
    p90: reckoning.readyS.p90 - restAndCheckS,
  };
}

export const inBand = (sorted: number[], value: number, share: number): boolean =>
  value >= quantile(sorted, (1 - share) / 2) && value <= quantile(sorted, (1 + share) / 2);

export const bandWidth = (sorted: number[], share: number): number =>
  quantile(sorted, (1 + share) / 2) - quantile(sorted, (1 - share) / 2);
