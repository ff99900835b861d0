/** The rest of a charge as the readings of its groups say: where it will settle, and when it has rested enough. */
import { predictRest } from '@/calc/index';
import type { Reckoning } from '@/calc/live-types';
import type { StoredRest } from '../entities/charge-json';
import type { ChargeFile } from './charge-file';
import { secondsOf } from './charge-clock';
import { validReadings } from './charge-reckoning';
import { correctedVolts } from './meter-trust';

/** The last readings that are looked back on; earlier ones count in each forecast all the same. */
const LOOKED_BACK = 20;

interface RestReading {
  /** Since the end of current, s. */
  s: number;
  groupVolts: number[];
}

/**
 * Forecast of a rest from the group readings since a person has said that the current is off: while a charger may still hold
 * its voltage, volts that stand still have not settled.
 * @param nowS s of the reckoning
 * @returns null where nothing rests for sure, or where the readings are too few to say anything
 */
export function restOf(file: ChargeFile, reckoning: Reckoning, nowS: number): StoredRest | null {
  const { charge } = file;
  const rests = reckoning.stage === 'resting' || reckoning.stage === 'check-due';
  if (!rests || !charge.currentOffSaid || charge.currentEndAt === null) return null;
  const endS = secondsOf(charge, charge.currentEndAt);
  const groups = reckoning.groups.length;
  const readings = validReadings(file.readings).flatMap(({ at, groupVolts, meterId }): RestReading[] => {
    const s = secondsOf(charge, at) - endS;
    if (groupVolts === null || groupVolts.length !== groups || s <= 0 || s > nowS - endS) return [];
    return [{ s, groupVolts: correctedVolts(groupVolts, file.meters.get(meterId ?? '') ?? null) }];
  });
  const present = together(readings, charge.toleranceVolts, nowS - endS);
  if (present === null) return null;
  const enoughS = enoughSince(readings, charge.toleranceVolts);
  return { ...present, enoughAtS: enoughS === null ? null : endS + enoughS, readings: readings.length };
}

/** All groups at once; null where one of them says nothing. The least sure of them decides. */
function together(readings: readonly RestReading[], toleranceVolts: number, nowS: number) {
  const groups = readings[0]?.groupVolts ?? [];
  const found = groups.map((_, group) =>
    predictRest(
      readings.map(({ s, groupVolts }) => ({ s, volts: groupVolts[group]! })),
      toleranceVolts,
      { nowS },
    ),
  );
  const all = found.flatMap((one) => one ?? []);
  if (all.length === 0 || all.length < found.length) return null;
  const enough = all.map(({ enoughAtS }) => enoughAtS);
  return {
    settledVolts: all.map(({ settledVolts }) => settledVolts),
    chance: Math.min(...all.map(({ chance }) => chance)),
    restedEnough: all.every(({ restedEnough }) => restedEnough),
    enoughAtS: enough.some((at) => at === null) ? null : Math.max(...enough.map((at) => at!)),
  };
}

/**
 * Since when it has rested enough, or when that is expected, s since the end of current. What an earlier reading has said and
 * all later ones have borne out stays as it was: a further reading must not move the instant on.
 */
function enoughSince(readings: readonly RestReading[], toleranceVolts: number): number | null {
  const after = (count: number) => together(readings.slice(0, count), toleranceVolts, readings[count - 1]!.s);
  let since = after(readings.length);
  for (let count = readings.length - 1; count > 0 && readings.length - count < LOOKED_BACK; count -= 1) {
    if (since === null || !since.restedEnough) break;
    const earlier = after(count);
    if (earlier?.enoughAtS == null || earlier.enoughAtS > readings[count]!.s) break;
    since = earlier;
    if (!earlier.restedEnough) break;
  }
  return since?.enoughAtS ?? null;
}

/** A reckoning whose rest ends when the readings say that it has rested enough, where that is earlier. */
export function withRestEnd(reckoning: Reckoning, enoughAtS: number | null, nowS: number): Reckoning {
  const { restEndS, readyS } = reckoning;
  if (enoughAtS === null || enoughAtS >= restEndS) return reckoning;
  const byS = restEndS - enoughAtS;
  return {
    ...reckoning,
    stage: nowS >= enoughAtS ? 'check-due' : 'resting',
    restEndS: enoughAtS,
    readyS: { p10: readyS.p10 - byS, p50: readyS.p50 - byS, p90: readyS.p90 - byS },
    segments: reckoning.segments.map((segment) => {
      if (segment.kind === 'rest') return { ...segment, toS: Math.min(segment.toS, enoughAtS) };
      return segment.kind === 'check' ? { ...segment, fromS: segment.fromS - byS, toS: segment.toS - byS } : segment;
    }),
  };
}
