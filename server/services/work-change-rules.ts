import { invalid } from '../errors/domain-error';
import { personRefs } from '../repositories/person-refs.repository';
import type { WorkStint } from '../entities/work-stint';
import { standing } from './work-file';
import type { WorkColumns } from './work.service';
import type { WorkWrite } from './work-write';

const GAP = '\u00a0';

/**
 * What a change may not touch: what somebody's stint stands on while they have it in hand, and what is done already.
 * @throws DomainError 400 with the field at fault
 */
export async function refuseChangeInHand(write: WorkWrite, columns: WorkColumns): Promise<void> {
  const { file } = write;
  const { work } = file;
  const [inHand] = standing(file);
  const fields: Record<string, string> = {};
  if (inHand) {
    const who = await nameOf(write, inHand);
    const first = `${who} has it in hand. Give it back first`;
    if (columns.placeId !== work.placeId) fields.placeId = `${first}, then change the place.`;
    if (columns.skillId !== work.skillId) fields.skillId = `${first}, then change the skill.`;
    if (!work.splittable)
      for (const name of ['likelyMinutes', 'longMinutes'] as const)
        if (columns[name] !== work[name]) fields[name] = `${first}, or say at its end how many minutes are left of it.`;
  }
  // An estimate that comes out below what is done or in hand would leave less than nothing.
  const least = {
    likelyMinutes: work.likelyMinutes - work.leftMinutes,
    longMinutes: work.longMinutes - work.leftLongMinutes,
  };
  const rest = work.leftLongMinutes > 0 ? 1 : 0;
  for (const name of ['likelyMinutes', 'longMinutes'] as const)
    if (columns[name] < least[name] + rest)
      fields[name] ??= `${least[name]}${GAP}min of it are done or in hand. Type more than that.`;
  if (Object.keys(fields).length > 0) throw invalid(fields);
}

const nameOf = async ({ manager, workshop }: WorkWrite, stint: WorkStint): Promise<string> =>
  (await personRefs(manager, workshop.id)).get(stint.personId)?.name ?? 'Somebody';
