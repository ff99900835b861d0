import { CalcInputError } from '../errors';
import { openBetween } from './open-time';
import { simulateQueue } from './simulate-queue';
import { weekBootstrap } from './week-bootstrap';
import type { RecordedCharge, ReplayInput, ReplayLevers, ReplayResult, TooFew, WaitsControl } from './waits-types';

const NEEDS = 20;
const WEEK_MINUTES = 7 * 24 * 60;

/**
 * The recorded charges as they would have gone under other rules. Each takes on a kind what the model says for it there,
 * times what it really took over what the model says for what it really was. Wait: from wanted to ready. Lost: its open
 * hours, times the share that was not used. The same replay without levers is what to compare with.
 *
 * @returns figures with 80 % intervals; too few charges to say; null: it was told to stop
 * @throws CalcInputError for a lever or a charge that names no kind, or an actual time that is not above 0
 */
export function replayCharges(
  input: ReplayInput,
  levers: ReplayLevers,
  control: WaitsControl = {},
): ReplayResult | TooFew | null {
  const has = input.charges.length;
  if (has < NEEDS) return { enough: false, needs: NEEDS, has };
  const kinds = input.channels.length;
  const channels = [...input.channels];
  if (levers.moreOfKind !== undefined) {
    requireKind('moreOfKind', levers.moreOfKind, kinds);
    channels[levers.moreOfKind]! += 1;
  }
  if (levers.amps) requireKind('amps.kind', levers.amps.kind, kinds);
  const release = (one: RecordedCharge) =>
    levers.startAtBooking && one.bookedMinutes !== null
      ? Math.min(one.bookedMinutes, one.arrivalMinutes)
      : one.arrivalMinutes;
  const charges = [...input.charges].sort((one, other) => release(one) - release(other));
  const factors = charges.map((one) => {
    requireKind('kind', one.kind, kinds);
    if (!(one.actualMinutes > 0 && one.actualMinutes < Infinity))
      throw new CalcInputError('actualMinutes', one.actualMinutes, 'a number above 0');
    if (!(one.afterMinutes === undefined || (one.afterMinutes >= 0 && one.afterMinutes < Infinity)))
      throw new CalcInputError('afterMinutes', one.afterMinutes, '0 or more');
    if (!(one.usedShare >= 0 && one.usedShare <= 1))
      throw new CalcInputError('usedShare', one.usedShare, 'between 0 and 1');
    const model = input.durationMinutes(one, one.kind, {});
    return model !== null && model > 0 ? one.actualMinutes / model : 1;
  });
  const ran = simulateQueue(
    {
      arrivalMinutes: Float64Array.from(charges, release),
      dueMinutes: Float64Array.from(charges, (one) => one.dueMinutes ?? one.arrivalMinutes),
      channels,
      serviceMinutes: (charge, kind) => {
        const model = input.durationMinutes(charges[charge]!, kind, levers);
        return model === null ? null : model * factors[charge]!;
      },
      open: input.open,
      lookInMinutes: levers.lookInMinutes ?? input.lookInMinutes,
      mayRunUnwatched: (charge) => levers.overnightAllowed === true || charges[charge]!.ranUnwatched,
    },
    control,
  );
  if (!ran) return null;
  const done = [...charges.keys()].filter((at) => ran.kind[at]! >= 0);
  if (done.length < NEEDS) return { enough: false, needs: NEEDS, has: done.length };
  const openTime = openBetween(input.open);
  const readyAt = (at: number) => ran.endMinutes[at]! + (charges[at]!.afterMinutes ?? 0);
  const first = charges.reduce((least, one) => Math.min(least, one.arrivalMinutes), Infinity);
  const last = charges.reduce((most, one) => Math.max(most, one.arrivalMinutes), -Infinity);
  const { lost, p50, p90 } = weekBootstrap(
    {
      week: Int32Array.from(done, (at) => Math.floor((charges[at]!.arrivalMinutes - first) / WEEK_MINUTES)),
      weeks: Math.floor((last - first) / WEEK_MINUTES) + 1,
      waitHours: Float64Array.from(done, (at) => Math.max(0, readyAt(at) - charges[at]!.arrivalMinutes) / 60),
      lostHours: Float64Array.from(
        done,
        (at) => (openTime(charges[at]!.arrivalMinutes, readyAt(at)) / 60) * (1 - charges[at]!.usedShare),
      ),
    },
    input.seed,
  );
  return {
    enough: true,
    count: done.length,
    unplaced: ran.unplaced,
    lostHoursPerWeek: lost,
    p50WaitHours: p50,
    p90WaitHours: p90,
  };
}

function requireKind(field: string, kind: number, kinds: number): void {
  if (!Number.isInteger(kind) || kind < 0 || kind >= kinds)
    throw new CalcInputError(field, kind, `a channel kind, 0 to ${kinds - 1}`);
}
