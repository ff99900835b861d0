/** What to do first when a module smokes, smells or swells, by where its charge stands. */
import type { ChemistryId } from '@/calc/plan-types';
import type { ChargeDto } from '@/shared/contract/charge';
import { isToCome, isUnderWay } from './card-model';
import { actsOf } from './live-acts';

/** What the fire service needs to know of it. */
const fireName: Record<ChemistryId, string> = {
  nmc: 'lithium-ion, NMC',
  'lmo-blend': 'lithium-ion, LMO blend',
  lfp: 'lithium-ion, LFP',
  lto: 'lithium-ion, LTO',
  nimh: 'nickel metal hydride',
};

/**
 * Common practice, in the order of doing; the workshop's own emergency plan goes before it.
 *
 * @param chemistry null: not known yet, the caller is told both
 */
export const emergencySteps = (charge: Pick<ChargeDto, 'stage'>, chemistry: ChemistryId | null): string[] => [
  'Get everybody out and away. Do not touch or move the module. Do not breathe the smoke: it is poisonous.',
  'Raise the alarm.',
  isUnderWay(charge)
    ? 'Only if you reach it safely, without passing the smoke: switch the charger off at its emergency stop or plug.'
    : 'If it is still or already clipped on, and only if you reach it safely, without passing the smoke: switch the charger off at its emergency stop or plug.',
  `Close the door behind you and call the fire service. Say that a traction battery is burning or about to: ${chemistry ? fireName[chemistry] : 'lithium or NiMH'}.`,
  'Do not go back in. A module can flare up again hours later: the fire service says when it is safe.',
];

/** What is done with a module that swells or is warm without smoke, and what is noted here afterwards. */
export function withoutSmoke(charge: ChargeDto): string {
  const spare = charge.spare.label;
  if (isToCome(charge))
    return `Swelling or warmth without smoke: do not clip it on, and keep away. Put ${spare} into quarantine afterwards. Such a module is never charged.`;
  if (charge.stage === 'stopped')
    return `Swelling or warmth without smoke: keep away. Put ${spare} into quarantine afterwards, where that was not done with the stop. Such a module is never charged again.`;
  if (actsOf(charge).some(({ act }) => act === 'stop'))
    return 'Swelling or warmth without smoke: switch the charger off if you can reach it safely, keep away, and stop the charge here afterwards. Such a module is never charged again.';
  return `Swelling or warmth without smoke: do not fit it, and keep away. Shelve it here afterwards, so that the charge is over, and put ${spare} into quarantine. Such a module is never charged or fitted again.`;
}
