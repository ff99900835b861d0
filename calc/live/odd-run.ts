import type { OddSeen } from '../live-types';

/** One odd look: what it is of, and how far off in standard deviations. */
export type OddLook = Pick<OddSeen, 'kind' | 'quantity' | 'group' | 'seen' | 'expected'> & { off: number };

/**
 * Odd from here on, in standard deviations: one in 150 000 by chance where the spreads are right, so that a logger at 10 s
 * raises less than one false alarm in a hundred hours.
 */
export const ODD_OFF = 4.5;
/** This far off one reading is enough; nearer it takes a second one. */
const SURE_OFF = 6;

/** What counts first where several are odd. */
const ORDER: readonly OddSeen['kind'][] = [
  'no-current',
  'group-ahead',
  'voltage-jump',
  'stuck-current',
  'too-warm',
  'unexplained',
];

interface Run extends OddSeen {
  off: number;
}

/** The runs of odd readings, one for each quantity, as they begin, go on and end. */
export class OddRuns {
  private readonly runs = new Map<OddSeen['quantity'], Run>();

  /** @param count readings that this one stands for */
  note(quantity: OddSeen['quantity'], odd: OddLook | null, s: number, count: number): void {
    const run = this.runs.get(quantity);
    if (odd === null) this.runs.delete(quantity);
    else if (run)
      this.runs.set(quantity, {
        ...odd,
        // What began as a jump is one for as long as it lasts.
        kind: run.kind === 'voltage-jump' && odd.kind === 'unexplained' ? run.kind : odd.kind,
        off: Math.max(run.off, odd.off),
        sinceS: run.sinceS,
        readings: run.readings + count,
      });
    else this.runs.set(quantity, { ...odd, sinceS: s, readings: 1 });
  }

  /** What to raise now; null: nothing. */
  current(): OddSeen | null {
    const raised = [...this.runs.values()].filter((run) => run.readings > 1 || run.off >= SURE_OFF);
    raised.sort((one, other) => ORDER.indexOf(one.kind) - ORDER.indexOf(other.kind));
    const first = raised[0];
    if (!first) return null;
    const { kind, quantity, group, seen, expected, sinceS, readings } = first;
    return { kind, quantity, group, seen, expected, sinceS, readings };
  }
}
