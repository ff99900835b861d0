/** What stands on the label of a proven module. Pure. */
import type { ChargeDto } from '@/shared/contract/charge';
import { clock, date } from '../format/clock';
import type { LocaleMarks } from '../format/marks';
import { tolerance, volts, voltsNumber } from '../format/quantities';
import { firstName } from '../charge/card-model';
import type { LabelInput } from './label-layout';

/** Why no label is printed; null: it may be. Out of tolerance is never printed. */
export function noLabelReason(charge: ChargeDto): string | null {
  const last = charge.restChecks.at(-1);
  if (charge.stage !== 'ready' && charge.stage !== 'fitted')
    return 'A label says that a module is ready. This one is not checked and in tolerance.';
  if (!last?.verdict.within) return 'The last check was outside the tolerance: there is no label for it.';
  return null;
}

/** Every word of the label; the volts are those of the check, without the meter's offset. */
export function labelOf(charge: ChargeDto, zone: string, marks: LocaleMarks): LabelInput {
  const check = charge.restChecks.at(-1);
  const at = Date.parse(check?.at ?? charge.readyAt ?? charge.createdAt);
  return {
    title: charge.title,
    spare: charge.spare.label,
    position: charge.modulePosition === null ? null : `module ${charge.modulePosition}`,
    line: `${charge.typeName}, to ${volts(charge.targetVolts, marks)} ${tolerance(charge.toleranceVolts)}`,
    volts: (check?.verdict.groups ?? []).map((group) => voltsNumber(group.volts, marks)),
    ready: `ready ${date(at, zone, at)} ${clock(at, zone, marks)}${check ? `, ${firstName(check.by.name)}` : ''}`,
  };
}
