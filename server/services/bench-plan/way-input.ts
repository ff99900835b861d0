/** A charge that is not begun, as it is planned again: the same spare, target and way, from what is known now. */
import type { EntityManager } from 'typeorm';
import type { FrozenInputs } from '../../entities/charge-json';
import { DomainError } from '../../errors/domain-error';
import type { ChargeFile } from '../charge-file';
import { toInstant } from '../instants';
import { buildPlanInputs } from '../plan-inputs';
import type { WayInput } from './bench-tasks';

/** Ages of readings by whole hours: the same question is then answered once for an hour, and a module loses nothing in one. */
const AGE_STEP_S = 3600;

export interface PlannedAgain {
  ask: WayInput;
  /** What the charge would keep of it; its channels are free at once. */
  frozen: FrozenInputs;
  /** Why a channel is not among them, by its id. */
  blocked: Record<string, string>;
}

/**
 * @param clipOnAt epoch ms; null: whenever, so that the answer holds for every time
 * @throws DomainError where its spare cannot be planned any more, with the reason
 */
export async function plannedAgain(
  manager: EntityManager,
  { charge }: Pick<ChargeFile, 'charge'>,
  clipOnAt: number | null,
  now: number,
): Promise<PlannedAgain> {
  const soc = charge.frozen.target.soc ?? null;
  const inputs = await buildPlanInputs(
    manager,
    charge.workshopId,
    {
      spareId: charge.spareId,
      targetVolts: soc === null ? charge.targetVolts : null,
      targetSoc: soc === null ? null : soc * 100,
      // The band was taken when the charge was planned.
      acceptWideBand: true,
      toleranceMillivolts: Math.round(charge.toleranceVolts * 1e6) / 1000,
      meterId: charge.targetMeterId,
      packCelsius: charge.targetCelsius,
      readyBy: null,
      clipOnAt: clipOnAt === null ? null : toInstant(clipOnAt),
      repairRef: charge.repairRef,
      modulePosition: charge.modulePosition,
    },
    now,
  );
  const channels = inputs.frozen.channels.map((channel) => ({ ...channel, freeInS: 0 }));
  const { input } = inputs;
  const readingAgeS = Math.round(input.spare.readingAgeS / AGE_STEP_S) * AGE_STEP_S;
  return {
    ask: {
      input: {
        ...input,
        channels,
        ...(clipOnAt === null
          ? { spare: { ...input.spare, readingAgeS }, clipOnAtS: 0, workshop: { ...input.workshop, closesInS: null } }
          : { readyByS: charge.readyBy === null ? null : (charge.readyBy - now) / 1000 }),
      },
      way: charge.way,
      finish: charge.finish,
      knownEnd: charge.option.knownEnd ?? null,
    },
    frozen: { ...inputs.frozen, channels },
    blocked: Object.fromEntries(
      inputs.blockedChannels.flatMap(({ channelId, reason }) => (channelId === null ? [] : [[channelId, reason]])),
    ),
  };
}

/** Why a charge that waits cannot be planned again, as one sentence. @throws what is no such reason */
export function whyNotAgain(error: unknown): string {
  if (!(error instanceof DomainError) || error.status >= 500) throw error;
  return Object.values(error.extra.fields ?? {})[0] ?? error.message;
}
