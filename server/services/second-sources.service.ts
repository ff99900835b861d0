/** The second source: a hand meter at the module that the pack's reading points to, before anything is lifted out. */
import type { EntityManager } from 'typeorm';
import { compareSources } from '@/calc/index';
import { groupsAt } from '@/shared/contract/pack';
import { SOURCE_TOLERANCE_VOLTS, type DecideSourceInput, type SecondSourceInput } from '@/shared/contract/pack-reading';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import type { PackReading } from '../entities/pack-reading';
import type { SecondSource } from '../entities/second-source';
import { conflict, invalid, notFound } from '../errors/domain-error';
import { countChargersWithMeter } from '../repositories/chargers.repository';
import { insertSecondSource, updateSecondSource } from '../repositories/repair-rows.repository';
import { bare, cellText } from './charge-words';
import { newId } from './ids';
import { inMillivolts, packVerdict } from './pack-numbers';
import { readAt } from './read-instant';
import { repairFacts } from './repair-facts';
import type { RepairFile } from './repair-file';
import { changeRepair } from './repair-write';

/**
 * Keeps what the hand meter shows, and whether that agrees with the pack: the same volts at a module that the pack points
 * to, and the meter points to no other. Where they disagree the repair goes no further until somebody decides.
 * @throws DomainError 404 unknown reading, 400 with the field at fault
 */
export const addSecondSource = (
  deps: Deps,
  member: Member,
  id: string,
  input: SecondSourceInput,
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, {}, async ({ manager, file, note }) => {
    const { reading, groups, at } = checked(file, input, now);
    await refuseDisplay(manager, file, input.meterId);
    const found = compareSources({
      packVolts: reading.groupVolts,
      oddModule: groups,
      meterGroups: [
        ...input.groupVolts.map((volts, place) => ({ group: groups[place]!, volts })),
        ...(input.healthyGroup === null ? [] : [input.healthyGroup]),
      ],
      toleranceVolts: SOURCE_TOLERANCE_VOLTS,
    });
    const { positions } = packVerdict(reading.groupVolts, file.repair);
    const elsewhere = input.pointsTo !== null && input.pointsTo !== input.modulePosition;
    const row: SecondSource = {
      id: newId(),
      workshopId: member.workshopId,
      repairId: id,
      readingId: reading.id,
      modulePosition: input.modulePosition,
      groupVolts: input.groupVolts,
      healthyGroup: input.healthyGroup,
      meterId: input.meterId,
      pointsTo: elsewhere ? input.pointsTo : null,
      agrees: found.verdict === 'agree' && !elsewhere && positions.includes(input.modulePosition),
      differs: found.groups
        .filter(({ differs }) => differs)
        .map(({ group, differenceVolts }) => ({ group, millivolts: inMillivolts(differenceVolts) })),
      offsetMillivolts: found.offsetVolts === null ? null : inMillivolts(found.offsetVolts),
      at,
      personId: member.personId,
      decision: null,
      decidedPosition: null,
      decisionReason: null,
      decidedAt: null,
      decidedById: null,
      createdAt: now,
    };
    await insertSecondSource(manager, row);
    const lowest = input.groupVolts.indexOf(Math.min(...input.groupVolts));
    const meter = file.meters.get(input.meterId ?? '')?.name;
    const said = row.agrees ? 'agrees' : elsewhere ? `points to module ${input.pointsTo}` : 'disagrees';
    note(
      `second source: ${cellText(input.groupVolts[lowest]!)} at G${groups[lowest]! + 1}${meter === undefined ? '' : `, ${meter}`}: ${said}`,
      at,
    );
  });

/** A charger's display shows its own clips, not a module in the pack. @throws DomainError 400 */
async function refuseDisplay(
  manager: EntityManager,
  { repair, meters }: RepairFile,
  meterId: string | null,
): Promise<void> {
  if (meterId === null || (await countChargersWithMeter(manager, repair.workshopId, meterId)) === 0) return;
  const name = meters.get(meterId)?.name ?? 'This meter';
  throw invalid({ meterId: `${name} is the display of a charger. Read the module with a hand meter.` });
}

function checked(
  { repair, readings, meters }: RepairFile,
  input: SecondSourceInput,
  now: number,
): { reading: PackReading; groups: number[]; at: number } {
  const fields: Record<string, string> = {};
  const reading = readings.find((one) => one.id === input.readingId && one.setAsideAt === null);
  if (!reading)
    throw invalid({ readingId: 'This reading is not one of this repair, or it is set aside. Take another.' });
  const groups = groupsAt(repair, input.modulePosition);
  if (groups.length === 0) fields.modulePosition = `This pack has no module ${input.modulePosition}. Type another.`;
  else if (input.groupVolts.length !== groups.length)
    fields.groupVolts = `Module ${input.modulePosition} has ${groups.length === 1 ? '1 group' : `${groups.length} groups`}; ${input.groupVolts.length} were read.`;
  if (input.pointsTo !== null && groupsAt(repair, input.pointsTo).length === 0)
    fields.pointsTo = `This pack has no module ${input.pointsTo}. Type another.`;
  const healthy = input.healthyGroup;
  if (healthy !== null && healthy.group >= repair.groupCount)
    fields['healthyGroup.group'] = `This pack has ${repair.groupCount} groups. Type one of them.`;
  else if (healthy !== null && groups.includes(healthy.group))
    fields['healthyGroup.group'] = `Group ${healthy.group + 1} is one of this module. Read one of another module.`;
  if (input.meterId !== null && !meters.has(input.meterId))
    fields.meterId = 'This meter is not on the list. Choose another.';
  const at = readAt(input.at, now, fields);
  if (Object.keys(fields).length > 0) throw invalid(fields);
  return { reading, groups, at };
}

/**
 * Decides where the two sources disagree: which module it is, or that the pack is read again. Kept with name and reason.
 * @throws DomainError 404 unknown, 409 where they agree, where it was decided already, or where a later one is there
 */
export const decideSource = (
  deps: Deps,
  member: Member,
  id: string,
  sourceId: string,
  input: DecideSourceInput,
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, {}, async ({ manager, file, note }) => {
    const source = file.sources.find((one) => one.id === sourceId);
    if (!source) throw notFound('This second source');
    if (source.decision !== null) throw conflict('decided_already', `It was decided already: ${source.decisionReason}`);
    if (source.agrees) throw conflict('sources_agree', 'The two sources agree: there is nothing to decide.');
    if (repairFacts(file).source?.id !== sourceId)
      throw conflict('later_source', 'There is a later reading. Decide on that one.');
    const { modulePosition } = input;
    if (modulePosition !== null && groupsAt(file.repair, modulePosition).length === 0)
      throw invalid({ modulePosition: `This pack has no module ${modulePosition}. Type another.` });
    await updateSecondSource(manager, member.workshopId, sourceId, {
      decision: input.decision,
      decidedPosition: modulePosition,
      decisionReason: input.reason,
      decidedAt: now,
      decidedById: member.personId,
    });
    const what = modulePosition === null ? 'the pack is read again' : `it is module ${modulePosition}`;
    note(`decided that ${what}: ${bare(input.reason)}`);
  });
