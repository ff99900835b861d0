import type { Band, Segment, SegmentKind } from '@/calc/plan-types';

const names: Record<SegmentKind, string> = {
  queue: 'queued',
  hands: 'hands-on',
  cc: 'constant current',
  taper: 'taper',
  rest: 'rest',
  check: 'check',
};

/**
 * The ribbon in words: 'Charging, constant current until 13:52, taper until 14:25, rest until 15:25; ready 15:30,
 * between 15:15 and 15:55.' Only what is still to come after `nowS`.
 *
 * @param at turns seconds of the ribbon into words: a clock, or a stretch from the clip-on.
 */
export function ribbonTwin({
  segments,
  band,
  at,
  hanging = false,
  nowS = null,
  heldFromS = null,
  stoppedAtS = null,
}: {
  segments: readonly Segment[];
  band?: Band | null;
  at: (s: number) => string;
  hanging?: boolean;
  nowS?: number | null;
  heldFromS?: number | null;
  stoppedAtS?: number | null;
}): string {
  if (stoppedAtS !== null) return `Stopped ${at(stoppedAtS)}.`;
  const ahead = segments.filter(({ kind, toS }) => kind !== 'check' && (nowS === null || toS > nowS));
  const flows = ahead.some(({ kind }) => kind === 'cc' || kind === 'taper');
  const way = flows ? (hanging ? 'discharging' : 'charging') : null;
  const stretches = ahead.map(({ kind, toS }) => `${names[kind]} until ${at(toS)}`);
  const finish = band ? `ready ${at(band.p50)}, between ${at(band.p10)} and ${at(band.p90)}` : null;
  const held = heldFromS === null ? null : `held since ${at(heldFromS)}`;
  const course = [held, way, ...stretches].filter((word) => word !== null).join(', ');
  const text = [course, finish].filter((part) => part !== null && part !== '').join('; ');
  if (text === '') return 'Current and rest are over.';
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}.`;
}
