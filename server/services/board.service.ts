import type { EntityManager } from 'typeorm';
import type { BoardDto } from '@/shared/contract/board';
import type { ChargeCardDto } from '@/shared/contract/charge';
import type { Deps } from '../deps';
import { listBenchCharges } from '../repositories/charges.repository';
import { listOpenHolds } from '../repositories/open-holds.repository';
import { listUsableChannels } from '../repositories/chargers.repository';
import { benchOrder, onTheWall, wallOrder } from './board-order';
import { chargeCard } from './charge-dto';
import { STOPPED_ON_BOARD_MS } from './charge-due';
import { loadBench, loadFiles, type Bench } from './charge-file';
import { titleOf } from './charge-words';
import { toInstant } from './instants';
import { openingOf } from './working-hours';

/** All of a workshop's charges as they look at an instant, whoever looks, and what they were read with. */
export interface WholeBoard {
  board: Omit<BoardDto, 'next'>;
  bench: Bench;
}

/** The bench as the people of a workshop see it: all open charges, in the order in which they want a hand. */
export async function benchBoard(deps: Deps, workshopId: string, now: number): Promise<BoardDto> {
  const { board } = await readBoard(deps.dataSource.manager, workshopId, now);
  return { ...board, charges: benchOrder(board.charges, now), next: nextPlanned(board.charges) };
}

/** The board as a wall shows it: without what is only planned or has long been ready, soonest first. */
export async function wallBoard(deps: Pick<Deps, 'dataSource'>, workshopId: string, now: number): Promise<BoardDto> {
  return asOnTheWall((await readBoard(deps.dataSource.manager, workshopId, now)).board, now);
}

/** What a wall shows of all charges. */
export const asOnTheWall = (board: WholeBoard['board'], now: number): BoardDto => ({
  ...board,
  charges: wallOrder(board.charges.filter((card) => onTheWall(card, now))),
  next: nextPlanned(board.charges),
});

/**
 * Some of the charges as they look now; one that is missing stands on no bench any more.
 * @param bench what stands around all charges, as it was read with the others
 */
export async function readCards(
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
  bench: Bench,
  now: number,
): Promise<ChargeCardDto[]> {
  const rows = await listBenchCharges(manager, workshopId, now - STOPPED_ON_BOARD_MS, ids);
  return (await loadFiles(manager, workshopId, rows, bench)).map((file) => chargeCard(file, now));
}

/** All charges on the bench, read from the database. */
export async function readBoard(manager: EntityManager, workshopId: string, now: number): Promise<WholeBoard> {
  const bench = await loadBench(manager, workshopId);
  const rows = await listBenchCharges(manager, workshopId, now - STOPPED_ON_BOARD_MS);
  const files = await loadFiles(manager, workshopId, rows, bench);
  const cards: ChargeCardDto[] = files.map((file) => chargeCard(file, now));
  const running = new Map(
    (await listOpenHolds(manager, workshopId))
      .filter(({ hold }) => hold.state === 'running')
      .map(({ hold, charge }) => [hold.channelId, titleOf(charge)]),
  );
  const opening = openingOf(bench.workshop, now);
  const board = {
    rev: bench.workshop.boardRev,
    at: toInstant(now),
    workshop: { id: workshopId, name: bench.workshop.name, zone: bench.workshop.zone },
    charges: cards,
    channels: (await listUsableChannels(manager, workshopId)).map(({ channel }) => ({
      id: channel.id,
      name: channel.name,
      maxAmps: channel.maxAmps,
      chargeTitle: running.get(channel.id) ?? null,
    })),
    openToday: opening === null ? null : { from: toInstant(opening.from), to: toInstant(opening.to) },
  };
  return { board, bench };
}

/** What comes first of what is only planned. */
function nextPlanned(cards: readonly ChargeCardDto[]): BoardDto['next'] {
  const planned = cards.filter((card) => card.stage === 'planned');
  const first = planned.sort((a, b) => Date.parse(a.clipOnAt) - Date.parse(b.clipOnAt))[0];
  return first ? { title: first.title, clipOnAt: first.clipOnAt, channelNames: first.channelNames } : null;
}
