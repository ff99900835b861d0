import type { RepairBlock } from '@/shared/contract/repair';
import { isUnderWay } from './charge-stages';
import { millivoltsText } from './charge-words';
import type { RepairFacts } from './repair-facts';
import { conditionBlock } from './module-conditions';
import type { RepairFile } from './repair-file';

type BlockFile = Pick<RepairFile, 'workshop' | 'photos' | 'removed' | 'people'>;

/** What keeps a repair from going on; null: nothing does. */
export function repairBlock(file: BlockFile, facts: RepairFacts): RepairBlock | null {
  const { arrival, source, settled, verdict, open } = facts;
  if (facts.disagree && source !== null && verdict !== null)
    return {
      code: 'sources-disagree',
      text: disagreeText(verdict.positions[0] ?? null, source),
      role: file.workshop.technicianDecides === true ? null : 'foreman',
    };
  const condition = conditionBlock(file, facts.failing);
  if (condition !== null) return condition;
  if (arrival !== null && settled === null && verdict !== null && verdict.positions.length === 0)
    return {
      code: 'module-unknown',
      text: 'No group of the pack stands out. Read it again, or at another state of charge, or use the hand meter.',
      role: null,
    };
  if (open === null) return null;
  const check = open.restChecks.at(-1);
  if (open.charge.stage === 'check-due' && check && !check.verdict.within) {
    const worst = check.verdict.groups[check.verdict.worstGroup];
    const by = worst === undefined ? '' : `, group ${worst.group + 1} by ${millivoltsText(worst.deviationVolts)}`;
    return {
      code: 'check-outside',
      text: `${open.spare.label} is outside the tolerance after its rest${by}. Top it up, or put it back.`,
      role: null,
    };
  }
  const odd = open.charge.reckoning?.reckoning.odd ?? null;
  if (odd !== null && isUnderWay(open.charge.stage))
    return {
      code: 'charge-odd',
      text: `The readings of ${open.spare.label} are odd. Look at the charge.`,
      role: null,
    };
  return null;
}

function disagreeText(packSays: string | null, source: { pointsTo: string | null; modulePosition: string }): string {
  const meterSays = source.pointsTo ?? source.modulePosition;
  if (packSays === null) return `The pack points to no module, your meter to ${meterSays}.`;
  if (packSays !== meterSays) return `The pack says module ${packSays}, your meter says ${meterSays}.`;
  return `The pack and your meter read module ${packSays} differently.`;
}
