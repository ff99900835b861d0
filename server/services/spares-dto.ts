import type { PersonRef } from '@/shared/contract/common';
import type { SpareCapacityDto, SpareDto, SpareReadingDto, SpareWhere } from '@/shared/contract/spare';
import type { ModuleType } from '../entities/module-type';
import type { Spare } from '../entities/spare';
import type { SpareCapacity } from '../entities/spare-capacity';
import type { SpareReading } from '../entities/spare-reading';
import type { SpareMove } from '../repositories/spare-moves.repository';
import type { SpareCharge } from '../repositories/spares.repository';
import { titleOf } from './charge-words';
import { toInstant } from './instants';
import { usedCapacity } from './spare-capacity';

export type People = ReadonlyMap<string, PersonRef>;

const personRef = (people: People, id: string): PersonRef => people.get(id) ?? { id, name: 'Somebody' };

/** Where a spare is: quarantine goes before all, then what was fitted, then its charge. */
export function whereIs(spare: Spare, charge: SpareCharge | undefined): SpareWhere {
  if (spare.quarantinedAt !== null) return 'quarantine';
  if (spare.fittedAt !== null) return 'fitted';
  return charge ? 'charge' : 'shelf';
}

export const spareReadingDto = (
  reading: SpareReading,
  people: People,
  move: SpareMove | undefined,
): SpareReadingDto => ({
  id: reading.id,
  at: toInstant(reading.at),
  groupVolts: reading.groupVolts,
  celsius: reading.celsius,
  meterId: reading.meterId,
  by: personRef(people, reading.personId),
  note: reading.note,
  movedBy: move && move.until > reading.at ? { id: move.charge.id, title: titleOf(move.charge) } : null,
});

const capacityDto = (capacity: SpareCapacity, people: People): SpareCapacityDto => ({
  id: capacity.id,
  at: toInstant(capacity.at),
  by: personRef(people, capacity.personId),
  ampHours: capacity.ampHours,
  sdAh: capacity.sdAh,
  source: capacity.source,
  state: capacity.state,
  apart: capacity.apart,
  chargeId: capacity.chargeId,
});

export function spareDto(
  spare: Spare,
  type: ModuleType,
  around: {
    reading: SpareReading | undefined;
    charge: SpareCharge | undefined;
    move: SpareMove | undefined;
    people: People;
    capacities: readonly SpareCapacity[];
  },
): SpareDto {
  const { reading, charge, move, people, capacities } = around;
  const { capacityAh, sdAh } = usedCapacity(spare, type);
  return {
    id: spare.id,
    label: spare.label,
    moduleTypeId: spare.moduleTypeId,
    shelfPlace: spare.shelfPlace,
    capacityAh: spare.capacityAh,
    healthPercent: spare.healthPercent,
    capacitySource: spare.capacitySource,
    condition: spare.condition,
    note: spare.note,
    typeName: type.name,
    groupsInSeries: type.groupsInSeries,
    chargeLimitVolts: type.chargeLimitVolts,
    dischargeLimitVolts: type.dischargeLimitVolts,
    floorVolts: type.floorVolts,
    shelfVolts: type.shelfVolts,
    where: whereIs(spare, charge),
    usedCapacityAh: capacityAh,
    capacitySdAh: sdAh,
    capacities: capacities.map((one) => capacityDto(one, people)),
    quarantine:
      spare.quarantinedAt === null
        ? null
        : {
            reason: spare.quarantineReason ?? '',
            at: toInstant(spare.quarantinedAt),
            by: personRef(people, spare.quarantinedById ?? ''),
          },
    charge: charge ? { id: charge.id, title: titleOf(charge), stage: charge.stage, rev: charge.rev } : null,
    reading: reading ? spareReadingDto(reading, people, move) : null,
    rev: spare.rev,
  };
}
