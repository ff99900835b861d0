import type { EntityManager } from 'typeorm';
import { groupVoltsProblems } from '@/shared/contract/group-volts';
import type { SpareDto, SpareReadingInput } from '@/shared/contract/spare';
import type { Deps, Member } from '../deps';
import type { ModuleType } from '../entities/module-type';
import { SpareReading } from '../entities/spare-reading';
import { conflict, invalid, notFound } from '../errors/domain-error';
import { findMeter } from '../repositories/meters.repository';
import { findModuleType } from '../repositories/module-types.repository';
import { lastMoveOf } from '../repositories/spare-moves.repository';
import { insertSpareReading, openChargesBySpare } from '../repositories/spares.repository';
import { announceStock } from './announce';
import { isRunning } from './charge-stages';
import { titleOf } from './charge-words';
import { newId } from './ids';
import { knownSpare, spareDtoOf } from './spare-file';
import { inTransaction } from './unit-of-work';

/** A phone's clock may be this far ahead, ms. */
const CLOCK_SLACK_MS = 5 * 60_000;

/**
 * Keeps what a spare's groups read at rest. Volts under the floor are kept too: the plan refuses them.
 * @throws DomainError 409 where the spare is fitted or does not rest (on a charge, or joined to one by a resistor), 400 with the field at fault
 */
export async function addSpareReading(
  deps: Deps,
  member: Member,
  spareId: string,
  input: SpareReadingInput,
  now: number,
): Promise<SpareDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const spare = await knownSpare(manager, workshopId, spareId);
    if (spare.fittedAt !== null)
      throw conflict('spare_fitted', `${spare.label} was fitted and is no longer in stock. Its readings are closed.`);
    const charge = (await openChargesBySpare(manager, workshopId)).get(spareId);
    if (charge && charge.stage !== 'planned' && charge.stage !== 'queued')
      throw conflict(
        'spare_on_charge',
        `${spare.label} is on ${titleOf(charge)}. Log the reading at the charge.`,
        await spareDtoOf(manager, workshopId, spareId),
      );
    const joined = await lastMoveOf(manager, workshopId, spareId);
    if (joined?.asNeighbour && (isRunning(joined.charge.stage) || joined.charge.stage === 'held'))
      throw conflict(
        'spare_on_charge',
        `${spare.label} is joined to another spare for ${titleOf(joined.charge)}. Read it when the resistor is off.`,
        await spareDtoOf(manager, workshopId, spareId),
      );
    const type = await findModuleType(manager, workshopId, spare.moduleTypeId);
    if (!type) throw notFound('The type of this spare');
    await insertSpareReading(manager, await readingRow(manager, member, spareId, type, input, now));
    return spareDtoOf(manager, workshopId, spareId);
  });
  announceStock(deps, member, now);
  return dto;
}

/**
 * A reading as a row, checked against the spare's type.
 * @param prefix of the field paths, where the reading stands inside another form: 'reading.'
 * @throws DomainError 400 with the field at fault
 */
export async function readingRow(
  manager: EntityManager,
  member: Member,
  spareId: string,
  type: ModuleType,
  input: SpareReadingInput,
  now: number,
  prefix = '',
): Promise<SpareReading> {
  const fields = groupVoltsProblems(input.groupVolts, type, `${prefix}groupVolts`);
  if (input.meterId !== null && !(await findMeter(manager, member.workshopId, input.meterId)))
    fields[`${prefix}meterId`] = 'This meter is not on the list. Choose another.';
  const at = input.at === undefined ? now : Date.parse(input.at);
  if (at > now + CLOCK_SLACK_MS) fields[`${prefix}at`] = 'This time is still to come. Type when it was read.';
  if (Object.keys(fields).length > 0) throw invalid(fields);
  return Object.assign(new SpareReading(), {
    id: newId(),
    workshopId: member.workshopId,
    spareId,
    at: Math.min(at, now),
    groupVolts: input.groupVolts,
    celsius: input.celsius,
    meterId: input.meterId,
    personId: member.personId,
    note: input.note ?? null,
    createdAt: now,
  });
}
