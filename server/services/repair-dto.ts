import type { EntityManager } from 'typeorm';
import type { PackDto } from '@/shared/contract/pack';
import type { TargetDto } from '@/shared/contract/pack-reading';
import type {
  AdvisedDto,
  FittedSpareDto,
  RemovedModuleDto,
  RepairCardDto,
  RepairDto,
  RepairEventDto,
  RepairPageDto,
  RepairState,
  RepairWaitDto,
} from '@/shared/contract/repair';
import { aimOf, positionsOf } from '@/shared/contract/pack';
import type { Repair } from '../entities/repair';
import type { StoredTarget } from '../entities/repair-json';
import type { RepairWait } from '../entities/repair-wait';
import { eventsOfRepairs } from '../repositories/repair-rows.repository';
import { personRef } from './alert-dto';
import { chargeCard } from './charge-dto';
import { overdueSince } from './charge-due';
import { toInstant, toOptionalInstant } from './instants';
import { moduleConditions } from './module-conditions';
import { computedTarget, packVerdict } from './pack-numbers';
import { packReadingDto, secondSourceDto } from './pack-reading-dto';
import { photoDto } from './photo-dto';
import { repairBlock } from './repair-block';
import { repairFacts, type RepairFacts } from './repair-facts';
import { loadRepairFile, type RepairFile } from './repair-file';
import { expectedAfterFit, forecastOf } from './repair-forecast';
import { repairSteps } from './repair-steps';
import { spareAsItIs } from './spare-as-it-is';

export const stateOf = (repair: Repair): RepairState =>
  repair.deletedAt !== null
    ? 'deleted'
    : repair.archivedAt !== null
      ? 'archived'
      : repair.handedOverAt !== null
        ? 'handed-over'
        : 'open';

type Pack = Pick<
  Repair,
  'moduleTypeId' | 'groupCount' | 'groupsPerModule' | 'positionOfGroup' | 'bleedAmps' | 'aimMillivolts'
>;

export const packDto = (pack: Pack, moduleTypeName: string | null): PackDto => ({
  moduleTypeId: pack.moduleTypeId,
  groupCount: pack.groupCount,
  groupsPerModule: pack.groupsPerModule,
  positionOfGroup: pack.positionOfGroup,
  bleedAmps: pack.bleedAmps,
  aimMillivolts: aimOf(pack),
  moduleTypeName,
  moduleCount: new Set(positionsOf(pack)).size,
});

/** A charge that asks for a hand, or for a look. */
function chargeNeedsSomebody({ open }: RepairFacts, now: number): boolean {
  if (open === null) return false;
  const { stage } = open.charge;
  return stage === 'check-due' || stage === 'held' || overdueSince(open, now) !== null;
}

/** A repair as lists show it. */
export function repairCard(file: RepairFile, now: number): RepairCardDto {
  const { repair, people, waits } = file;
  const facts = repairFacts(file);
  const state = stateOf(repair);
  const open = state === 'open';
  const steps = repairSteps(file, facts);
  const block = open ? repairBlock(file, facts) : null;
  return {
    id: repair.id,
    number: repair.number,
    vehicle: repair.vehicle,
    bay: repair.bay,
    people: file.personIds.map((id) => personRef(people, id)!),
    promisedAt: toOptionalInstant(repair.promisedAt),
    state,
    // All seven done and not handed over yet: it is still at the last one.
    step: open ? (steps.find((one) => one.state !== 'done')?.step ?? 'prove') : null,
    block,
    failing: facts.failing,
    charge: facts.open === null ? null : chargeCard(facts.open, now),
    spreadMillivolts: facts.latest === null ? null : packVerdict(facts.latest.groupVolts, repair).spreadMillivolts,
    needsSomebody: open && (block !== null || chargeNeedsSomebody(facts, now)),
    waits: waits.some(({ toAt }) => toAt === null),
    rev: repair.rev,
    bookedAt: toInstant(repair.bookedAt),
  };
}

function targetDto({ people }: RepairFile, target: StoredTarget | null): TargetDto | null {
  if (target === null) return null;
  const { personId, at, ...taken } = target;
  return { ...taken, at: toInstant(at), by: personRef(people, personId)! };
}

const waitDto = ({ people }: RepairFile, wait: RepairWait): RepairWaitDto => ({
  id: wait.id,
  from: toInstant(wait.fromAt),
  to: toOptionalInstant(wait.toAt),
  modulePosition: wait.modulePosition,
  corrected:
    wait.correctedAt === null
      ? null
      : {
          reason: wait.correctionReason ?? '',
          at: toInstant(wait.correctedAt),
          by: personRef(people, wait.correctedById)!,
        },
});

const removedDto = ({ people, removed }: RepairFile): RemovedModuleDto[] =>
  removed.map(({ id, modulePosition, fate, note, at, personId }) => ({
    id,
    modulePosition,
    fate,
    note,
    at: toInstant(at),
    by: personRef(people, personId)!,
  }));

const fittedDto = ({ people, spares, fittedAsItIs }: RepairFile): FittedSpareDto[] =>
  fittedAsItIs.map(({ id, spareId, modulePosition, groupVolts, note, at, personId }) => ({
    id,
    spare: { id: spareId, label: spares.get(spareId)?.label ?? '' },
    modulePosition,
    groupVolts,
    note,
    at: toInstant(at),
    by: personRef(people, personId)!,
  }));

const advisedDto = ({ people, advised }: RepairFile): AdvisedDto[] =>
  advised.map(({ id, text, outcome, detail, agreedBy, agreedAt, at, personId }) => ({
    id,
    text,
    outcome,
    detail,
    agreedBy,
    agreedAt: toOptionalInstant(agreedAt),
    at: toInstant(at),
    by: personRef(people, personId)!,
  }));

/** A repair with all but its log. */
export function repairDto(file: RepairFile, now: number): RepairDto {
  const { repair, people, type, spare, meters } = file;
  const facts = repairFacts(file);
  const meter = meters.get(facts.arrival?.meterId ?? '') ?? null;
  return {
    ...repairCard(file, now),
    packTypeId: repair.packTypeId,
    packTypeName: file.packTypeName,
    pack: packDto(repair, type?.name ?? null),
    customerName: repair.customerName,
    customerContact: repair.customerContact,
    personIds: file.personIds,
    note: repair.note,
    steps: repairSteps(file, facts),
    readings: file.readings.map((reading) => packReadingDto(file, reading)),
    sources: file.sources.map((source) => secondSourceDto(people, source)),
    computed: facts.arrival === null ? null : computedTarget(facts.arrival, repair, facts.failing, type, meter, now),
    target: targetDto(file, facts.target),
    spare: spare === null ? null : { id: spare.id, label: spare.label, shelfPlace: spare.shelfPlace },
    charges: file.charges.map((charge) => chargeCard(charge, now)),
    fittedAsItIs: fittedDto(file),
    removed: removedDto(file),
    advised: advisedDto(file),
    wait: file.waits.map((wait) => waitDto(file, wait)),
    photos: file.photos.map((photo) => photoDto(file, photo)),
    conditions: moduleConditions(file),
    expectedAfterFit: expectedAfterFit(file, facts),
    forecast: forecastOf(file, facts),
    bookedBy: personRef(people, repair.bookedById)!,
    handedOver:
      repair.handedOverAt === null
        ? null
        : {
            at: toInstant(repair.handedOverAt),
            by: personRef(people, repair.handedOverById)!,
            note: repair.handOverNote,
          },
    deleted:
      repair.deletedAt === null
        ? null
        : {
            at: toInstant(repair.deletedAt),
            by: personRef(people, repair.deletedById)!,
            reason: repair.deleteReason ?? '',
          },
    erased:
      repair.erasedAt === null
        ? null
        : {
            at: toInstant(repair.erasedAt),
            by: personRef(people, repair.erasedById)!,
            reason: repair.eraseReason ?? '',
          },
  };
}

/** A repair as its own page shows it, its log newest first. */
export async function repairPage(manager: EntityManager, file: RepairFile, now: number): Promise<RepairPageDto> {
  const { id, workshopId } = file.repair;
  const events = (await eventsOfRepairs(manager, workshopId, [id])).get(id) ?? [];
  const asItIs = await spareAsItIs(manager, file, now);
  return {
    ...repairDto(file, now),
    asItIs: asItIs && { readAt: toInstant(asItIs.reading.at), old: asItIs.old },
    events: events.map((event): RepairEventDto => ({
      id: event.id,
      at: toInstant(event.at),
      by: personRef(file.people, event.personId),
      text: event.text,
    })),
  };
}

/** @throws DomainError 404 */
export const repairPageOf = async (
  manager: EntityManager,
  workshopId: string,
  id: string,
  now: number,
): Promise<RepairPageDto> => repairPage(manager, await loadRepairFile(manager, workshopId, id), now);
