/** The ways to look at the list of repairs. Pure. */
import type { RepairCardDto, RepairsQuery } from '@/shared/contract/repair';

export type RepairView = 'open' | 'needs' | 'waiting' | 'handed-over' | 'archived' | 'deleted';

/** `none` begins 'No … matches “typed”', `empty` stands where nothing was looked for. */
export const views: Readonly<Record<RepairView, { none: string; empty: string }>> = {
  open: { none: 'No open repair', empty: 'No repair is open.' },
  needs: { none: 'No repair that needs somebody', empty: 'No repair needs somebody now.' },
  waiting: { none: 'No waiting repair', empty: 'No repair waits for its module now.' },
  'handed-over': { none: 'No repair handed over', empty: 'No repair was handed over yet.' },
  archived: { none: 'No repair in the archive', empty: 'The archive is empty.' },
  deleted: { none: 'No deleted repair', empty: 'No repair is deleted.' },
};

/** What is asked of the server for a view: those that need somebody or wait are among the open ones. */
export const stateAsked = (view: RepairView): RepairsQuery['state'] =>
  view === 'handed-over' || view === 'archived' || view === 'deleted' ? view : undefined;

/** The repairs of a view, out of the last list where the next one is still coming. */
export const inView = (view: RepairView, cards: readonly RepairCardDto[]): RepairCardDto[] =>
  cards
    .filter(({ state }) => state === (stateAsked(view) ?? 'open'))
    .filter((card) => (view === 'needs' ? card.needsSomebody : view === 'waiting' ? card.waits : true));
