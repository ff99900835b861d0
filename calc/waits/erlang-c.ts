import { CalcInputError } from '../errors';

/**
 * Chance of a wait before the start at c channels that are offered a charges at a time (a = arrivals · mean time):
 * C = cB/(c − a(1 − B)) with B(k) = aB/(k + aB). A rough figure: it supposes chance arrivals and times, round the clock.
 *
 * @throws CalcInputError for no channel or a load that they cannot carry
 */
export function erlangC(channels: number, load: number): number {
  if (!Number.isInteger(channels) || channels < 1)
    throw new CalcInputError('channels', channels, 'a whole number, 1 or more');
  if (!(load >= 0 && load < channels)) throw new CalcInputError('load', load, `0 or more and below ${channels}`);
  let blocked = 1;
  for (let k = 1; k <= channels; k += 1) blocked = (load * blocked) / (k + load * blocked);
  return (channels * blocked) / (channels - load * (1 - blocked));
}

/** The least channels at which a share `p` of charges begins within `wishedMinutes`: P(W > t) = C e^(−(c − a)t/S). */
export function erlangChannels(load: number, meanMinutes: number, wishedMinutes: number, p: number): number {
  if (!(load >= 0 && load < 10000)) throw new CalcInputError('load', load, '0 or more and below 10000');
  if (!(meanMinutes > 0)) throw new CalcInputError('meanMinutes', meanMinutes, 'a number above 0');
  if (!(wishedMinutes >= 0)) throw new CalcInputError('wishedMinutes', wishedMinutes, '0 or more');
  if (!(p > 0 && p < 1)) throw new CalcInputError('p', p, 'between 0 and 1');
  let channels = Math.floor(load) + 1;
  while (erlangC(channels, load) * Math.exp((-(channels - load) * wishedMinutes) / meanMinutes) > 1 - p) channels += 1;
  return channels;
}
