/** From how far away the parts of a wall are read (look: cap height at least a 215th of the distance, 16 arc minutes). */
import { wallScale } from '../theme/tokens';

const capShare = 0.7;
const distancePerCap = 215;
/** Width of a 16:9 screen as a share of its diagonal. */
const widthShare = 16 / Math.hypot(16, 9);

export interface Reach {
  name: string;
  /** In a sentence: 'band'. */
  short: string;
  /** Farthest reader, m. */
  metres: number;
}

/** Largest part first, for a 16:9 screen of this diagonal in inches. */
export function reachOf(diagonalInches: number): Reach[] {
  const mmPerPx = (diagonalInches * 25.4 * widthShare) / 1920;
  const of = (px: number) => (px * mmPerPx * distancePerCap) / 1000;
  const { time, repair, stage, glyph, meta } = wallScale.upTo6;
  return [
    { name: 'Time', short: 'time', metres: of(time * capShare) },
    { name: 'Stage sign', short: 'stage sign', metres: of(glyph) },
    { name: 'Repair', short: 'repair', metres: of(repair * capShare) },
    { name: 'Stage word', short: 'stage word', metres: of(stage * capShare) },
    { name: 'Channel, band', short: 'band', metres: of(meta * capShare) },
  ];
}

/** '11', '7.6' */
export const metresNumber = (metres: number): string =>
  metres >= 10 ? String(Math.round(metres)) : String(Math.round(metres * 10) / 10);

/** 'Stage word and band are for those who step closer.' */
export function reachSentence(reach: readonly Reach[], distance: number): string {
  const near = reach.filter(({ metres }) => metres < distance).map(({ short }) => short);
  if (near.length === 0) return 'All of it is read from there.';
  if (near.length === reach.length) return 'Too far for this screen: nothing of it is read from there.';
  const list = near.length > 1 ? `${near.slice(0, -1).join(', ')} and ${near.at(-1)}` : near[0]!;
  return `${list.charAt(0).toUpperCase()}${list.slice(1)} ${near.length > 1 ? 'are' : 'is'} for those who step closer.`;
}
