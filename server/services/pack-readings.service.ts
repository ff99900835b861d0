/** The readings of a pack: entered, and set aside where they were wrong. */
import { groupVoltsProblem } from '@/shared/contract/group-volts';
import type { PackReadingInput } from '@/shared/contract/pack-reading';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import type { PackReading } from '../entities/pack-reading';
import { conflict, invalid, notFound } from '../errors/domain-error';
import { insertPackReading, updatePackReading } from '../repositories/repair-rows.repository';
import { newId } from './ids';
import { readAt } from './read-instant';
import type { RepairFile } from './repair-file';
import { bare } from './charge-words';
import { changeRepair } from './repair-write';

/**
 * Keeps a reading of all groups. One with a wrong number of groups, or with a voltage that the module type cannot have, is
 * refused as a whole.
 * @throws DomainError 400 with the field at fault, 409 where the repair is over
 */
export const addPackReading = (
  deps: Deps,
  member: Member,
  id: string,
  input: PackReadingInput,
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, {}, async ({ manager, file, note }) => {
    const fields = problemsOf(file, input);
    const at = readAt(input.at, now, fields);
    if (Object.keys(fields).length > 0) throw invalid(fields);
    const { at: _typed, ...columns } = input;
    const row: PackReading = {
      ...columns,
      id: newId(),
      workshopId: member.workshopId,
      repairId: id,
      at,
      personId: member.personId,
      setAsideAt: null,
      setAsideById: null,
      setAsideReason: null,
      createdAt: now,
    };
    await insertPackReading(manager, row);
    note(readText(row), at);
  });

function problemsOf({ repair, type, meters }: RepairFile, input: PackReadingInput): Record<string, string> {
  const { groupVolts, meterId } = input;
  const fields: Record<string, string> = {};
  if (groupVolts.length !== repair.groupCount) {
    const read = groupVolts.length === 1 ? '1 voltage was' : `${groupVolts.length} voltages were`;
    fields.groupVolts = `This pack has ${repair.groupCount === 1 ? '1 group' : `${repair.groupCount} groups`}; ${read} read.`;
  } else if (type !== null)
    groupVolts.forEach((volts, group) => {
      const problem = groupVoltsProblem(volts, type);
      if (problem !== null) fields[`groupVolts.${group}`] = problem;
    });
  if (meterId !== null && !meters.has(meterId)) fields.meterId = 'This meter is not on the list. Choose another.';
  return fields;
}

const stageWords = { arrival: 'at arrival', 'after-fit': 'after the fit' } as const;
const sourceWords = { typed: 'typed', pasted: 'pasted', file: 'by upload' } as const;

export const stageText = ({ stage, balanceCount }: Pick<PackReading, 'stage' | 'balanceCount'>): string =>
  stage === 'after-balance' ? `after balance charge ${balanceCount ?? 1}` : stageWords[stage];

const readText = (reading: PackReading): string =>
  `pack read ${stageText(reading)}, ${reading.groupVolts.length} groups, ${sourceWords[reading.source]}`;

/**
 * Sets a reading aside that was wrong. It stays with the reason; what was built on it is done anew.
 * @throws DomainError 404 unknown, 409 set aside already
 */
export const setReadingAside = (
  deps: Deps,
  member: Member,
  id: string,
  readingId: string,
  input: { reason: string },
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, {}, async ({ manager, file, note }) => {
    const reading = file.readings.find((one) => one.id === readingId);
    if (!reading) throw notFound('This reading');
    if (reading.setAsideAt !== null)
      throw conflict('set_aside', `This reading is set aside already: ${reading.setAsideReason}`);
    const patch = { setAsideAt: now, setAsideById: member.personId, setAsideReason: input.reason };
    await updatePackReading(manager, member.workshopId, readingId, patch);
    note(`set the reading ${stageText(reading)} aside: ${bare(input.reason)}`);
  });
