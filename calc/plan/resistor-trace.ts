import type { TracePoint } from '../types';

const POINTS = 16;

/**
 * Course of a current that dies away through a resistor: exponential from its peak to its end, the charge scaled so that it
 * starts and ends where the step does.
 */
export function resistorTrace(course: {
  peakAmps: number;
  endAmps: number;
  seconds: number;
  socFrom: number[];
  socTo: number[];
  terminalVolts: (soc: number[], amps: number) => number;
}): TracePoint[] {
  const { peakAmps, endAmps, seconds, socFrom, socTo } = course;
  if (!(seconds > 0)) return [];
  const fall = Math.log(Math.max(Math.abs(peakAmps / endAmps), 1 + 1e-9));
  return Array.from({ length: POINTS + 1 }, (_, at) => {
    const part = at / POINTS;
    const amps = peakAmps * Math.exp(-fall * part);
    const moved = (1 - Math.exp(-fall * part)) / (1 - Math.exp(-fall));
    const soc = socFrom.map((from, group) => from + (socTo[group]! - from) * moved);
    return { s: seconds * part, amps, terminalVolts: course.terminalVolts(soc, amps), soc };
  });
}
