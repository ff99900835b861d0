import { reckonCharge } from '@/calc/index';
import type { LiveReading, ReckonInput, Reckoning } from '@/calc/live-types';
import type { ChargeReading } from '../entities/charge-reading';
import type { ChargeFile } from './charge-file';
import { secondsOf } from './charge-clock';
import { stepOfEachRun } from './charge-steps';
import { correctedVolts } from './meter-trust';

/** Readings that count: a corrected one is replaced by its correction. In the order of time. */
export const validReadings = (readings: readonly ChargeReading[]): ChargeReading[] =>
  readings.filter((reading) => reading.replacedById === null).sort((one, other) => one.at - other.at);

/** What the core reckons a charge from: the way it was planned, the numbers it was planned with, and what happened. */
export function reckonInput(file: ChargeFile, at: number): ReckonInput {
  const { charge } = file;
  const { frozen } = charge;
  const steps = stepOfEachRun(charge.option, file.runs);
  return {
    module: frozen.module,
    spare: frozen.spare,
    target: frozen.target,
    channels: frozen.channels,
    resistors: frozen.resistors,
    workshop: frozen.workshop,
    option: charge.option,
    celsius: frozen.celsius,
    seed: frozen.seed,
    ...(frozen.spreads === undefined ? {} : { spreads: frozen.spreads }),
    runs: file.runs.map((run, index) => ({
      fromS: secondsOf(charge, run.fromAt),
      toS: run.toAt === null ? null : secondsOf(charge, run.toAt),
      stepIndex: steps[index],
    })),
    readings: validReadings(file.readings).map((reading) => liveReading(file, reading)),
    currentOffAtS:
      charge.currentOffSaid && charge.currentEndAt !== null ? secondsOf(charge, charge.currentEndAt) : null,
    nowS: Math.max(0, secondsOf(charge, at)),
  };
}

/** The known offset of the meter is taken off the groups; at the clips it is lost in the second decimal. */
const liveReading = (file: ChargeFile, reading: ChargeReading): LiveReading => ({
  s: secondsOf(file.charge, reading.at),
  terminalVolts: reading.terminalVolts,
  amps: reading.amps,
  celsius: reading.celsius,
  ...(reading.takenAt === null ? {} : { takenAt: reading.takenAt }),
  meterId: reading.meterId,
  groupVolts:
    reading.groupVolts === null
      ? null
      : correctedVolts(reading.groupVolts, file.meters.get(reading.meterId ?? '') ?? null),
});

/** Where a started charge stands at an instant, by its plan and all that was read. */
export const reckonAt = (file: ChargeFile, at: number): Reckoning => reckonCharge(reckonInput(file, at));
