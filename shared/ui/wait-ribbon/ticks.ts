import { clock } from '../format/clock';
import { NBSP, pointMarks, type LocaleMarks } from '../format/marks';
import { localTime } from '../format/zone';

export interface Tick {
  s: number;
  text: string;
}

const steps = [900, 1800, 3600, 7200, 10_800, 21_600, 43_200, 86_400];
const labelWidth = 52;
/** '12:00 pm' beside the last one, which stands inside the end of the axis. */
const labelWidth12 = 90;

/** The shortest step whose labels stand at least 52 px apart. */
export const tickStep = (spanS: number, width: number, minWidth = labelWidth): number =>
  steps.find((step) => (step / spanS) * width >= minWidth) ?? steps.at(-1) ?? 86_400;

/**
 * Ticks on round hours of the zone's own clock. `zeroInstant` is the epoch ms at which the seconds of the axis are 0.
 */
export function clockTicks({
  zeroInstant,
  fromS,
  toS,
  width,
  zone,
  marks = pointMarks,
  stepS = tickStep(toS - fromS, width, marks.hour12 ? labelWidth12 : labelWidth),
}: {
  zeroInstant: number;
  fromS: number;
  toS: number;
  width: number;
  zone: string;
  stepS?: number;
  marks?: LocaleMarks;
}): Tick[] {
  const start = Math.ceil((zeroInstant / 1000 + fromS) / 60) * 60;
  const local = localTime(start * 1000, zone);
  const past = (local.hour * 3600 + local.minute * 60) % stepS;
  const ticks: Tick[] = [];
  for (let at = start + (past === 0 ? 0 : stepS - past); at <= zeroInstant / 1000 + toS + 1e-6; at += stepS) {
    ticks.push({ s: at - zeroInstant / 1000, text: clock(at * 1000, zone, marks) });
  }
  return ticks;
}

/** Ticks counted from the clip-on: 'clip on', '1 h', '2 h'. */
export function spanTicks({
  toS,
  width,
  stepS = tickStep(toS, width),
}: {
  toS: number;
  width: number;
  stepS?: number;
}): Tick[] {
  const ticks: Tick[] = [];
  for (let s = 0; s <= toS + 1e-6; s += stepS) {
    const hours = s / 3600;
    const text = Number.isInteger(hours) ? `${hours}${NBSP}h` : `${s / 60}${NBSP}min`;
    ticks.push({ s, text: s === 0 ? 'clip on' : text });
  }
  return ticks;
}

export type TickAnchor = 'start' | 'middle' | 'end';

/** Where a tick's word stands: at an end of the axis it is pushed inside, so that nothing is cut. */
export const tickAnchor = (x: number, width: number, snap: boolean): TickAnchor =>
  snap && x < 12 ? 'start' : snap && x > width - 12 ? 'end' : 'middle';
