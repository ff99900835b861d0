import { tickStep } from '../wait-ribbon/ticks';

/** Step of an axis that counts from clip-on, s: whole hours from two hours on, as '90 min' beside '2 h' reads badly. */
export const spanStep = (toS: number, width: number): number => Math.max(toS > 7200 ? 3600 : 0, tickStep(toS, width));
