/** One person's day as a list in the order of time. Pure; instants are epoch ms. */
import type { FreeStretchDto, MyDayDto, PlanBlockDto, PlanLookInDto, Span } from '@/shared/contract/bench-plan';

export type DayEntry = { key: string; at: number; to: number } & (
  | { kind: 'block'; block: PlanBlockDto }
  | { kind: 'look-in'; lookIn: PlanLookInDto; next: boolean }
  | { kind: 'break'; span: Span }
  | { kind: 'free'; free: FreeStretchDto }
  | { kind: 'now' }
);

/** At the same instant: what takes a moment first, then what is to be done, then what is free. */
const order: Readonly<Record<DayEntry['kind'], number>> = { now: 0, 'look-in': 1, block: 2, break: 3, free: 4 };

/**
 * Hands, fills, look-ins, breaks and free time in their order, with a mark of now where it lies within the day. A look-in
 * that is done stands where it was done; of those of a charge the soonest that is not is the next. What was given back is
 * not the person's any more.
 */
export function dayEntries(day: MyDayDto, now: number, today: string): DayEntry[] {
  const next = new Map<string, string>();
  for (const { chargeId, dueAt, doneAt } of [...day.lookIns].sort((a, b) => a.dueAt.localeCompare(b.dueAt)))
    if (doneAt === null && !next.has(chargeId)) next.set(chargeId, dueAt);
  const entries: DayEntry[] = [
    ...day.blocks
      .filter(({ stint }) => stint?.state !== 'given-back')
      .map((block, index): DayEntry => ({ key: `block-${index}`, ...times(block), kind: 'block', block })),
    ...day.lookIns.map((lookIn): DayEntry => {
      const at = Date.parse(lookIn.doneAt ?? lookIn.dueAt);
      return {
        key: `look-in-${lookIn.chargeId}-${lookIn.dueAt}`,
        ...{ at, to: at, kind: 'look-in', lookIn },
        next: next.get(lookIn.chargeId) === lookIn.dueAt && lookIn.doneAt === null,
      };
    }),
    ...day.breaks.map((span, index): DayEntry => ({ key: `break-${index}`, ...times(span), kind: 'break', span })),
    ...day.free.map((free, index): DayEntry => ({ key: `free-${index}`, ...times(free), kind: 'free', free })),
  ];
  const anything = entries.length > 0 || day.present.length > 0;
  if (day.day === today && anything) entries.push({ key: 'now', at: now, to: now, kind: 'now' });
  return entries.sort((a, b) => a.at - b.at || order[a.kind] - order[b.kind] || a.to - b.to);
}

const times = ({ from, to }: Span) => ({ at: Date.parse(from), to: Date.parse(to) });

/** Where the hands of a block are done or looked up; null: it is a fill, which has its own buttons. */
export function wayOf({ kind, chargeId, to }: PlanBlockDto, now: number): string | null {
  if (kind === 'fill' || chargeId === null) return null;
  const live = `/charges/${chargeId}`;
  if (Date.parse(to) <= now) return live;
  return kind === 'clip-on' ? `${live}/checks` : kind === 'check' ? `${live}/check` : live;
}
