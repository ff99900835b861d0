/** The end of a charge: the check after the rest, fitting, the shelf, and whose it is. */
import { judgeCheck } from '@/calc/index';
import type { CheckVerdict } from '@/calc/plan-types';
import type { ChargeDto, TypedRestCheck } from '@/shared/contract/charge';
import { restCheckSchemaFor } from '@/shared/contract/rest-check';
import { can } from '@/shared/contract/roles';
import { giveAlert } from '../alerts/turns';
import type { Deps, Member } from '../deps';
import { forbidden, invalid, notFound } from '../errors/domain-error';
import { fieldsOf } from '../errors/zod-fields';
import { alertsOfCharge } from '../repositories/alerts.repository';
import { insertRestCheck } from '../repositories/charge-rows.repository';
import { updateSpare } from '../repositories/charge-stock.repository';
import { insertSpareReading } from '../repositories/spares.repository';
import { announceStock } from './announce';
import { actInstant } from './charge-instants';
import type { ChargeFile } from './charge-file';
import { isOpen } from './charge-stages';
import { wrongStage } from './charge-stage-conflict';
import { markVisit } from './charge-visit';
import { ampHoursText, bare, durationText, groupsText, millivoltsText, upperFirst } from './charge-words';
import { changeCharge, type ChargeWrite } from './charge-write';
import { keepFoundCapacity } from './found-capacity';
import { newId } from './ids';
import { correctedVolts } from './meter-trust';

/**
 * Judges the group voltages after the rest. In: ready. Out: the check stays due, with what each group needs.
 *
 * The known offset of the meter is taken off before the verdict. The voltages are kept with the spare too: a top-up is
 * planned from them. A check before the rest is over counts; it is marked early, and the log says so.
 * @throws DomainError 409 where nothing rests, 400 with the sentence per voltage that cannot be
 */
export async function checkAfterRest(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  typed: TypedRestCheck,
  now: number,
): Promise<ChargeDto> {
  const dto = await changeCharge(deps, member, id, rev, now, async (write) => {
    const { manager, file } = write;
    const { charge } = file;
    if (charge.stage !== 'resting' && charge.stage !== 'check-due')
      throw wrongStage(write, 'The check comes after the current has ended.');
    const { module, target, spare } = charge.frozen;
    const read = restCheckSchemaFor(module, charge.toleranceVolts).safeParse(typed);
    if (!read.success) throw invalid(fieldsOf(read.error));
    const input = read.data;
    const fields: Record<string, string> = {};
    const meter = input.meterId === null ? null : (file.meters.get(input.meterId) ?? null);
    if (input.meterId !== null && meter === null) fields.meterId = 'This meter is not on the list. Choose another.';
    if (Object.keys(fields).length > 0) throw invalid(fields);
    const at = actInstant(file, input.at, now, { at: charge.currentEndAt ?? now, name: 'the end of current' });
    const verdict = judgeCheck(correctedVolts(input.groupVolts, meter), target, module, spare.capacityAh);
    const row = {
      groupVolts: input.groupVolts,
      celsius: input.celsius,
      meterId: input.meterId,
      personId: member.personId,
    };
    const check = {
      id: newId(),
      workshopId: charge.workshopId,
      chargeId: charge.id,
      at,
      ...row,
      verdict,
      early: isEarly(file, at),
      createdAt: now,
    };
    await insertRestCheck(manager, check);
    file.restChecks.push(check);
    await insertSpareReading(manager, {
      id: newId(),
      workshopId: charge.workshopId,
      spareId: charge.spareId,
      at,
      ...row,
      note: `Check of ${charge.number}`,
      createdAt: now,
    });
    await markVisit(write, at, null);
    const early = earlyText(file, at);
    await keepFoundCapacity(write, check);
    charge.checkedAt = at;
    if (verdict.within) {
      charge.stage = 'ready';
      charge.readyAt = at;
    }
    write.note(verdict.within ? 'ready' : 'outside', `${verdictText(verdict)}${early}`, at);
  });
  announceStock(deps, member, now);
  return dto;
}

/** End of the workshop's minimum rest, epoch ms. */
const minimumRestEnd = ({ charge }: ChargeFile): number =>
  (charge.currentEndAt ?? 0) + charge.frozen.workshop.minRestS * 1000;

const isEarly = (file: ChargeFile, at: number): boolean =>
  at < Math.max(file.charge.checkDueAt ?? 0, minimumRestEnd(file));

function earlyText(file: ChargeFile, at: number): string {
  const { checkDueAt } = file.charge;
  if (!isEarly(file, at)) return '';
  if (checkDueAt !== null && at < checkDueAt)
    return ` Checked early, ${durationText((checkDueAt - at) / 1000)} before the rest was over.`;
  const before = durationText((minimumRestEnd(file) - at) / 1000);
  return ` Checked early, ${before} before the minimum rest was over: the readings say that it has settled.`;
}

function verdictText(verdict: CheckVerdict): string {
  const worst = verdict.groups[verdict.worstGroup]!;
  const side = worst.deviationVolts < 0 ? 'below' : 'above';
  if (verdict.within)
    return `Ready, in tolerance: group ${worst.group + 1} is farthest off, ${millivoltsText(worst.deviationVolts)} ${side}.`;
  const outside = verdict.groups.filter((group) => !group.within);
  if (outside.length === 1) {
    const [one] = outside;
    const away = one!.deviationVolts < 0 ? 'below' : 'above';
    const needs = `${ampHoursText(Math.abs(one!.ampHoursToGo))} ${one!.ampHoursToGo < 0 ? 'less' : 'more'}`;
    return `Group ${one!.group + 1} is ${millivoltsText(one!.deviationVolts)} ${away}, outside. It needs ${needs}.`;
  }
  const all = groupsText(outside.map((group) => group.group));
  return `${upperFirst(all)} are outside, at most ${millivoltsText(worst.deviationVolts)} ${side}.`;
}

/** The module goes into the pack. @throws DomainError 409 where it is not ready */
export function fitCharge(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: { note?: string | null },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, rev, now, async (write) => {
    const { manager, file } = write;
    const { charge, spare } = file;
    if (charge.stage !== 'ready') throw wrongStage(write, 'Only what was checked and is in tolerance is fitted.');
    charge.stage = 'fitted';
    charge.closedAt = now;
    await updateSpare(manager, charge.workshopId, spare.id, { fittedAt: now });
    const place = charge.modulePosition === null ? '' : ` as module ${charge.modulePosition}`;
    write.note('fitted', `Fitted: ${spare.label}${place}.${input.note ? ` ${bare(input.note)}.` : ''}`);
  });
}

/** The spare goes back on the shelf, in tolerance or not. @throws DomainError 409 before its check is due */
export function shelveCharge(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: { shelfPlace: string | null; note?: string | null },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, rev, now, async (write) => {
    const { manager, file } = write;
    const { charge, spare } = file;
    if (charge.stage !== 'ready' && charge.stage !== 'check-due')
      throw wrongStage(write, 'It goes back on the shelf after its rest. To end it before, stop it.');
    charge.stage = 'shelved';
    charge.closedAt = now;
    if (input.shelfPlace !== null) {
      await updateSpare(manager, charge.workshopId, spare.id, { shelfPlace: input.shelfPlace });
      spare.shelfPlace = input.shelfPlace;
    }
    const place = spare.shelfPlace === null ? 'Back on the shelf' : `Back on the shelf, ${spare.shelfPlace}`;
    const unread =
      charge.checkedAt === null ? ' Its groups were not checked: read them before it is planned again.' : '';
    write.note('shelved', `${place}.${input.note ? ` ${bare(input.note)}.` : ''}${unread}`);
  });
}

/**
 * Gives a charge to a colleague, with the alerts that are open. Own ones, and those that nobody has, by whoever runs
 * charges; a colleague's by who gives out people.
 */
export function handOver(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: { personId: string },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, rev, now, async (write) => {
    const { file } = write;
    const { charge, people } = file;
    if (!isOpen(charge.stage)) throw wrongStage(write, 'It is over and nobody’s any more.');
    const other = people.get(input.personId);
    if (!other) throw notFound('This person');
    if (other.disabledAt !== null) throw invalid({ personId: `${other.name} is disabled. Choose somebody else.` });
    const own = charge.personId === null || charge.personId === member.personId;
    const from = charge.personId === null ? null : (people.get(charge.personId)?.name ?? null);
    if (!own && !can(member.role, 'charge:assign'))
      throw forbidden(`This is ${from}'s charge. ${from} or a foreman hands it over.`);
    charge.personId = other.id;
    await passAlerts(write);
    write.note('handed-over', from === null ? `${other.name} has it.` : `From ${from} to ${other.name}.`);
  });
}

/** Open alerts go along; whoever gets them from somebody else hears them from now. */
async function passAlerts({ manager, file, member, now, passed }: ChargeWrite): Promise<void> {
  const { charge, workshop } = file;
  const heardFrom = charge.personId === member.personId ? null : now;
  for (const alert of await alertsOfCharge(manager, charge.workshopId, charge.id)) {
    if (alert.clearedAt !== null || alert.takenAt !== null || alert.personId === charge.personId) continue;
    const to = { personId: charge.personId, byId: member.personId, heardFrom };
    const patch = await giveAlert(manager, alert, to, workshop, now);
    if (heardFrom !== null) passed.push({ ...alert, ...patch });
  }
}
