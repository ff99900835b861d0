import { targetProblem } from '@/shared/contract/group-volts';
import type { TakeTargetInput } from '@/shared/contract/pack-reading';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import { invalid } from '../errors/domain-error';
import { cellText, bare } from './charge-words';
import { computedTarget } from './pack-numbers';
import { refuseDisagree } from './repair-disagree';
import { repairFacts } from './repair-facts';
import { changeRepair } from './repair-write';

/**
 * Takes the target that a reading's healthy groups have, or another with the reason. It stays as it was taken; the wait
 * of the repair begins with it.
 * @throws DomainError 409 where two sources disagree, 400 with the field at fault
 */
export const takeTarget = (
  deps: Deps,
  member: Member,
  id: string,
  input: TakeTargetInput,
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, {}, ({ file, note }) => {
    const { repair, type, meters } = file;
    const facts = repairFacts(file);
    refuseDisagree(file, facts);
    const reading = file.readings.find((one) => one.id === input.readingId && one.setAsideAt === null);
    if (!reading)
      throw invalid({ readingId: 'This reading is not one of this repair, or it is set aside. Take another.' });
    const meter = meters.get(reading.meterId ?? '') ?? null;
    const computed = computedTarget(reading, repair, facts.failing, type, meter, now);
    if (computed === null)
      throw invalid({ readingId: 'No healthy group is left in this reading. Read the pack again.' });
    const volts = input.volts ?? computed.volts;
    const typed = volts !== computed.volts;
    if (typed && input.reason === null)
      throw invalid({ reason: 'Say why another target than the computed one is taken.' });
    const offsetVolts = (meter?.offsetMillivolts ?? 0) / 1000;
    const problem = type === null ? null : targetProblem(volts, type, offsetVolts);
    if (problem !== null) throw invalid({ volts: problem });
    repair.target = {
      ...computed,
      volts,
      toleranceMillivolts: input.toleranceMillivolts,
      typed,
      reason: input.reason,
      at: now,
      personId: member.personId,
    };
    const why = typed ? ` in place of ${cellText(computed.volts)}: ${bare(input.reason ?? '')}` : '';
    note(`took ${cellText(volts)} as the target${why}`);
  });
