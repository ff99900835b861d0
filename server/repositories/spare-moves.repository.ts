/** Which charge has moved the groups of a spare last: its own, or one that a resistor joined it to. */
import { Brackets, type EntityManager, type SelectQueryBuilder } from 'typeorm';
import { Charge } from '../entities/charge';
import { Spare } from '../entities/spare';

export interface SpareMove {
  charge: Pick<Charge, 'id' | 'number' | 'repairRef' | 'stage'>;
  /** The last instant at which current has flowed, or will by the reckoning, epoch ms. */
  until: number;
  /** It was joined to the spare of that charge. */
  asNeighbour: boolean;
}

type MovedRow = Pick<
  Charge,
  'id' | 'number' | 'repairRef' | 'stage' | 'spareId' | 'neighbourSpareId' | 'startedAt' | 'currentEndAt'
>;

const columns = [
  'id',
  'number',
  'repairRef',
  'stage',
  'spareId',
  'neighbourSpareId',
  'startedAt',
  'currentEndAt',
] as const satisfies readonly (keyof MovedRow)[];

const begunCharges = (manager: EntityManager, workshopId: string): SelectQueryBuilder<Charge> =>
  manager
    .createQueryBuilder(Charge, 'charge')
    .select(columns.map((column) => `charge.${column}`))
    .where('charge.workshopId = :workshopId', { workshopId })
    .andWhere('charge.startedAt IS NOT NULL');

function lastOf(rows: readonly MovedRow[]): Map<string, SpareMove> {
  const last = new Map<string, SpareMove>();
  for (const { spareId, neighbourSpareId, startedAt, currentEndAt, ...charge } of rows) {
    const until = Math.max(startedAt ?? 0, currentEndAt ?? 0);
    for (const id of [spareId, neighbourSpareId]) {
      if (id === null || (last.get(id)?.until ?? -Infinity) >= until) continue;
      last.set(id, { charge, until, asNeighbour: id !== spareId });
    }
  }
  return last;
}

/** The last move of every spare that is in stock, by the spare's id. */
export async function lastMoves(manager: EntityManager, workshopId: string): Promise<Map<string, SpareMove>> {
  const inStock = (query: SelectQueryBuilder<Charge>): string =>
    query
      .subQuery()
      .select('spare.id')
      .from(Spare, 'spare')
      .where('spare.workshopId = :workshopId AND spare.fittedAt IS NULL')
      .getQuery();
  const query = begunCharges(manager, workshopId);
  const stock = inStock(query);
  return lastOf(await query.andWhere(`(charge.spareId IN ${stock} OR charge.neighbourSpareId IN ${stock})`).getMany());
}

/** The last move of one spare; null: no charge of it has begun. */
export async function lastMoveOf(
  manager: EntityManager,
  workshopId: string,
  spareId: string,
): Promise<SpareMove | null> {
  const rows = await begunCharges(manager, workshopId)
    .andWhere(
      new Brackets((either) => either.where('charge.spareId = :spareId').orWhere('charge.neighbourSpareId = :spareId')),
    )
    .setParameter('spareId', spareId)
    .getMany();
  return lastOf(rows).get(spareId) ?? null;
}
