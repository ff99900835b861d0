/** A workshop's own curve for a module type, out of a table that somebody has pasted or picked. */
import Papa from 'papaparse';
import { checkOwnCurve } from '@/calc/index';
import type { OcvTable } from '@/calc/types';
import type { ModuleTypeDto, OwnCurveInput } from '@/shared/contract/equipment';
import type { Deps, Member } from '../deps';
import type { ModuleType } from '../entities/module-type';
import { invalid, notFound, stale } from '../errors/domain-error';
import { countTypeUse, findModuleType, saveModuleType } from '../repositories/module-types.repository';
import { announceEquipment } from './announce';
import { moduleTypeDto } from './module-types-dto';
import { inTransaction } from './unit-of-work';

/**
 * Keeps a curve. Plans use it from now on; charges that exist keep the one they were planned with.
 * @throws DomainError 412 stale, 400 with a sentence for each row that cannot be ('csv.4'; 'csv' of the whole)
 */
export const saveOwnCurve = (
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: OwnCurveInput,
  now: number,
): Promise<ModuleTypeDto> => withCurve(deps, member, id, rev, (type) => readCurve(input.csv, type), now);

/** The published curve rules again. @throws DomainError 412 stale */
export const removeOwnCurve = (
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  now: number,
): Promise<ModuleTypeDto> => withCurve(deps, member, id, rev, () => null, now);

async function withCurve(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  curveOf: (type: ModuleType) => OcvTable | null,
  now: number,
): Promise<ModuleTypeDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const type = await findModuleType(manager, workshopId, id);
    if (!type) throw notFound('This module type');
    const use = (await countTypeUse(manager, workshopId)).get(id);
    if (type.rev !== rev) throw stale(moduleTypeDto(type, use));
    const saved = Object.assign(type, { ownCurve: curveOf(type), rev: rev + 1 });
    await saveModuleType(manager, saved);
    return moduleTypeDto(saved, use);
  });
  announceEquipment(deps, member, now);
  return dto;
}

function readCurve(csv: string, type: ModuleType): OcvTable {
  const rows = Papa.parse<string[]>(csv, { delimiter: separatorOf(csv) }).data;
  const read = checkOwnCurve(rows, type.chemistry);
  if (read.ok) return read.curve;
  if (separatorOf(csv) === ',' && rows.some((row) => row.length === 4))
    throw invalid({
      csv: 'The comma separates the columns and is the decimal mark too. Separate the columns by semicolons.',
    });
  const fields: Record<string, string> = {};
  for (const { row, text } of read.problems) {
    const path = row === null ? 'csv' : `csv.${row}`;
    const sentence = row === null ? text : `Row ${row}: ${text}`;
    fields[path] = fields[path] === undefined ? sentence : `${fields[path]} ${sentence}`;
  }
  throw invalid(fields);
}

/** A semicolon or a tab anywhere tells: where the comma is the decimal mark, counting would take it for the separator. */
const separatorOf = (csv: string): string => (csv.includes(';') ? ';' : csv.includes('\t') ? '\t' : ',');
