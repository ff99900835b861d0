import { CalcInputError } from '../errors';
import { erlangChannels } from './erlang-c';
import { replayCharges } from './replay-charges';
import type { ReplayInput, ReplayLevers, ReplayResult, TooFew, WaitsControl } from './waits-types';

export interface ChannelsNeeded {
  enough: true;
  /** Channels of the kind; null: not even `most` give the wished wait. */
  channels: number | null;
  /** The replay with them, or with `most`. */
  replay: ReplayResult;
  /** Channels by Erlang's formula for all kinds together, a rough figure; null: the time of a charge is longer than the wish. */
  roughChannels: number | null;
}

/**
 * The least channels of a kind with which 90 % of the recorded charges would have been ready within the wished hours.
 *
 * @param kind index of the channel kind to have more or fewer of
 * @param most channels to try at most
 * @returns too few charges to say; null: it was told to stop
 */
export function channelsNeeded(
  input: ReplayInput,
  levers: ReplayLevers,
  { kind, wishedP90Hours, most = 24 }: { kind: number; wishedP90Hours: number; most?: number },
  control: WaitsControl = {},
): ChannelsNeeded | TooFew | null {
  if (!(wishedP90Hours > 0)) throw new CalcInputError('wishedP90Hours', wishedP90Hours, 'a number above 0');
  if (!Number.isInteger(kind) || !(kind in input.channels)) throw new CalcInputError('kind', kind, 'a channel kind');
  if (!Number.isInteger(most) || most < 1) throw new CalcInputError('most', most, 'a whole number, 1 or more');
  let last: ReplayResult | null = null;
  for (let channels = 1; channels <= most; channels += 1) {
    const tried = input.channels.map((has, at) => (at === kind ? channels : has));
    const replay = replayCharges({ ...input, channels: tried }, levers, control);
    if (replay === null || !replay.enough) return replay;
    last = replay;
    if (replay.p90WaitHours.value <= wishedP90Hours)
      return { enough: true, channels, replay, roughChannels: rough(input, wishedP90Hours) };
  }
  return last && { enough: true, channels: null, replay: last, roughChannels: rough(input, wishedP90Hours) };
}

function rough({ charges }: ReplayInput, wishedHours: number): number | null {
  const mean = charges.reduce((sum, one) => sum + one.actualMinutes, 0) / charges.length;
  const first = charges.reduce((least, one) => Math.min(least, one.arrivalMinutes), Infinity);
  const last = charges.reduce((most, one) => Math.max(most, one.arrivalMinutes), -Infinity);
  const wished = wishedHours * 60 - mean;
  if (wished < 0 || !(last > first)) return null;
  return erlangChannels((mean * (charges.length - 1)) / (last - first), mean, wished, 0.9);
}
