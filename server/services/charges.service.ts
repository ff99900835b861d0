import type { ChargeCardDto, ChargeDto, ChargesQuery } from '@/shared/contract/charge';
import type { Deps, Member } from '../deps';
import { listBenchCharges, listClosedCharges } from '../repositories/charges.repository';
import { benchOrder } from './board-order';
import { chargeCard, chargeDto } from './charge-dto';
import { STOPPED_ON_BOARD_MS } from './charge-due';
import { loadFile, loadFiles } from './charge-file';

const PAGE_SIZE = 50;

/** Open charges in the order of the bench, or a page of those that are over, the last to end first. */
export async function charges(deps: Deps, member: Member, query: ChargesQuery, now: number): Promise<ChargeCardDto[]> {
  const { manager } = deps.dataSource;
  const { workshopId } = member;
  const rows = query.closed
    ? await listClosedCharges(manager, workshopId, Number(query.page ?? 1), PAGE_SIZE)
    : await listBenchCharges(manager, workshopId, now - STOPPED_ON_BOARD_MS);
  const cards = (await loadFiles(manager, workshopId, rows)).map((file) => chargeCard(file, now));
  return query.closed ? cards : benchOrder(cards, now);
}

/** @throws DomainError 404 where the workshop has no such charge */
export async function charge(deps: Deps, member: Member, id: string, now: number): Promise<ChargeDto> {
  const { manager } = deps.dataSource;
  return chargeDto(manager, deps.config, await loadFile(manager, member.workshopId, id), member, now);
}
