/** Whether a piece of work fits into a free stretch by itself, and why not. */
import { windowClock } from '@/calc/bench/window-clock';
import { leastPartMinutes } from '@/shared/contract/work-terms';
import { clockText, durationText } from '../charge-words';
import { without, type Stretch } from './spans';

export interface FreeTime extends Stretch {
  /** Look-ins within it, epoch ms. */
  lookIns: number[];
}

export interface PieceToFit {
  /** What nobody has in hand of it, by the long estimate, ms. */
  longMs: number;
  splittable: boolean;
  dueAt: number | null;
  place: { name: string; taken: Stretch[] } | null;
  /** Name of the skill that the person lacks; null: none. */
  lacks: string | null;
}

export type Fit =
  | { fits: true; from: number; to: number; workedMs: number }
  | { fits: false; overByMinutes: number | null; because: string };

const MINUTE_MS = 60_000;
const LEAST_PART_MS = leastPartMinutes * MINUTE_MS;

/**
 * The soonest that a piece is done in a stretch: whole, or of work that can be split as much as fits. A look-in within it
 * takes its time off, as in the filling of all waits.
 * @param lookInMs what one look-in takes
 */
export function fitInto(free: FreeTime, piece: PieceToFit, lookInMs: number, zone: string, now: number): Fit {
  if (piece.lacks !== null) return { fits: false, overByMinutes: null, because: `It needs ${piece.lacks}.` };
  const clock = windowClock({ personId: '', fromS: free.from, toS: free.to, lookInsS: free.lookIns }, lookInMs);
  const least = piece.splittable ? Math.min(piece.longMs, LEAST_PART_MS) : piece.longMs;
  const roomIn = ({ from, to }: Stretch): number => clock.between(Math.min(to, clock.leave(from)), to);
  const ends = Math.min(free.to, piece.dueAt ?? Infinity);
  const taken = piece.place?.taken ?? [];
  for (const gap of without([{ from: free.from, to: ends }], taken)) {
    const room = roomIn(gap);
    if (room < least) continue;
    const from = clock.leave(gap.from);
    const workedMs = Math.min(piece.longMs, room);
    return { fits: true, from, to: Math.min(gap.to, clock.finish(from, workedMs)), workedMs };
  }
  const room = roomIn(free);
  if (room < least) {
    const over = Math.ceil((least - room) / MINUTE_MS);
    return { fits: false, overByMinutes: over, because: `${durationText(over * 60)} too long` };
  }
  // Long enough, but cut short by somebody else at its place, or by its due time.
  const inTheWay = taken.filter((one) => one.from < ends && one.to > free.from);
  const because =
    inTheWay.length > 0
      ? `${piece.place!.name} is taken until ${clockText(Math.max(...inTheWay.map(({ to }) => to)), zone, now)}`
      : `Due at ${clockText(piece.dueAt ?? free.to, zone, now)}, before it could be done`;
  return { fits: false, overByMinutes: null, because };
}
