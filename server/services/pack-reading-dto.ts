import { classifyChange } from '@/calc/index';
import type { PackReadingDto, SecondSourceDto } from '@/shared/contract/pack-reading';
import type { PackReading } from '../entities/pack-reading';
import type { SecondSource } from '../entities/second-source';
import type { PersonName } from '../repositories/charge-stock.repository';
import { personRef } from './alert-dto';
import { toInstant } from './instants';
import { ampHoursOf, curveOf, orNull, packCapacityAh, packVerdict } from './pack-numbers';
import { standing } from './repair-facts';
import type { RepairFile } from './repair-file';

type People = ReadonlyMap<string, PersonName>;

/** A reading as the calculation takes it. */
export const logEntry = ({ groupVolts, stage, balanceCount }: PackReading) => ({
  volts: groupVolts,
  stage,
  ...(balanceCount === null ? {} : { balanceCount }),
});

/** What the reading before it makes of this one; null: there is none, no curve is known, or the two do not compare. */
function changeOf({ readings, type }: RepairFile, reading: PackReading): PackReadingDto['change'] {
  if (type === null || reading.setAsideAt !== null) return null;
  const standingOnes = standing(readings);
  const before = standingOnes[standingOnes.indexOf(reading) + 1];
  if (before === undefined) return null;
  const options = { curve: curveOf(type), capacityAh: packCapacityAh(type) };
  const found = orNull(() => classifyChange(logEntry(before), logEntry(reading), options));
  return found === null ? null : { kind: found.kind, ampHours: found.ampHours };
}

export function packReadingDto(file: RepairFile, reading: PackReading): PackReadingDto {
  const { repair, people, type } = file;
  const { positions, ...verdict } = packVerdict(reading.groupVolts, repair);
  const ampHours = ampHoursOf(reading.groupVolts, type);
  return {
    id: reading.id,
    stage: reading.stage,
    balanceCount: reading.balanceCount,
    groupVolts: reading.groupVolts,
    packVolts: reading.packVolts,
    celsius: reading.celsius,
    restedMinutes: reading.restedMinutes,
    meterId: reading.meterId,
    instrument: reading.instrument,
    source: reading.source,
    fileName: reading.fileName,
    note: reading.note,
    at: toInstant(reading.at),
    by: personRef(people, reading.personId)!,
    ...verdict,
    oddPositions: positions,
    groupAmpHours: ampHours?.groupAmpHours ?? null,
    spreadAmpHours: ampHours?.spreadAmpHours ?? null,
    change: changeOf(file, reading),
    setAside:
      reading.setAsideAt === null
        ? null
        : {
            reason: reading.setAsideReason ?? '',
            at: toInstant(reading.setAsideAt),
            by: personRef(people, reading.setAsideById)!,
          },
  };
}

export const secondSourceDto = (people: People, source: SecondSource): SecondSourceDto => ({
  id: source.id,
  readingId: source.readingId,
  modulePosition: source.modulePosition,
  groupVolts: source.groupVolts,
  healthyGroup: source.healthyGroup,
  meterId: source.meterId,
  pointsTo: source.pointsTo,
  at: toInstant(source.at),
  by: personRef(people, source.personId)!,
  agrees: source.agrees,
  differs: source.differs,
  offsetMillivolts: source.offsetMillivolts,
  decided:
    source.decision === null || source.decidedAt === null
      ? null
      : {
          decision: source.decision,
          modulePosition: source.decidedPosition,
          reason: source.decisionReason ?? '',
          at: toInstant(source.decidedAt),
          by: personRef(people, source.decidedById)!,
        },
});
