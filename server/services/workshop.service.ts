import type { ChangeWorkshopInput, WorkshopDto } from '@/shared/contract/workshop';
import type { Deps, Member } from '../deps';
import type { Workshop } from '../entities/workshop';
import { notFound, stale } from '../errors/domain-error';
import { findWorkshop, updateWorkshop } from '../repositories/workshops.repository';
import { toInstant } from './instants';
import { inTransaction } from './unit-of-work';
import { defaultSettings } from './workshop-defaults';

const defaults = defaultSettings('', 'UTC');

const workshopDto = (workshop: Workshop): WorkshopDto => ({
  id: workshop.id,
  name: workshop.name,
  zone: workshop.zone,
  workingHours: workshop.workingHours,
  toleranceMillivolts: workshop.toleranceMillivolts,
  minRestMinutes: workshop.minRestMinutes,
  lookInMinutes: workshop.lookInMinutes,
  inrushLimitC: workshop.inrushLimitC,
  lagLimitMillivolts: workshop.lagLimitMillivolts,
  technicianDecides: workshop.technicianDecides === true,
  unattendedCharges: workshop.unattendedCharges === true,
  lookInVisitMinutes: workshop.lookInVisitMinutes ?? defaults.lookInVisitMinutes,
  fitMinutes: workshop.fitMinutes ?? defaults.fitMinutes,
  passOnTellMinutes: workshop.passOnTellMinutes ?? defaults.passOnTellMinutes,
  passOnAmberMinutes: workshop.passOnAmberMinutes ?? defaults.passOnAmberMinutes,
  passOnAlarmMinutes: workshop.passOnAlarmMinutes ?? defaults.passOnAlarmMinutes,
  rev: workshop.rev,
});

export async function settings(deps: Deps, member: Member): Promise<WorkshopDto> {
  const workshop = await findWorkshop(deps.dataSource.manager, member.workshopId);
  if (!workshop) throw notFound('The workshop');
  return workshopDto(workshop);
}

/** Changes settings. Charges that exist keep the numbers they were planned with. @throws DomainError 412 */
export async function changeSettings(
  deps: Deps,
  member: Member,
  input: ChangeWorkshopInput & { rev: number },
  now: number,
): Promise<WorkshopDto> {
  const { rev, ...given } = input;
  const change = Object.fromEntries(Object.entries(given).filter(([, value]) => value !== undefined));
  const after = await inTransaction(deps, async (manager) => {
    const before = await findWorkshop(manager, member.workshopId);
    if (!before) throw notFound('The workshop');
    if (before.rev !== rev) throw stale(workshopDto(before));
    await updateWorkshop(manager, member.workshopId, { ...change, rev: rev + 1 });
    return { ...before, ...change, rev: rev + 1 } as Workshop;
  });
  deps.hub.toWorkshop(member.workshopId, 'workshop:changed', { at: toInstant(now) });
  return workshopDto(after);
}
