import { watchClean } from '../calc/reference/clean-charges';

/** False alarms that are asked for, in 100 h. */
const MOST = 1;

/** More than 100 h of clean charges each way, every reading seen: by hand, and with a logger (that takes minutes). */
export async function* benchAlarms(): AsyncGenerator<string> {
  for (const [name, everyS, lookEvery] of [
    ['by hand every 15 min', 900, 1],
    ['by a logger at 10 s', 10, 8],
  ] as const) {
    const { hours, alarms } = watchClean(everyS, lookEvery, 40);
    const rate = (100 * alarms) / hours;
    yield `clean charges read ${name}: ${alarms} false alarms in ${hours.toFixed(0)} h, ${rate.toFixed(2)} in 100 h${rate > MOST ? `  (wanted: ${MOST})` : ''}`;
  }
}
