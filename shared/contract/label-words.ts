/** What stands on the label of a proven module, on screen and on paper alike. Pure; each side writes numbers its own way. */
import type { ChargeDto } from './charge';
import type { LabelInput } from './label-layout';

type Labelled = Pick<
  ChargeDto,
  | 'stage'
  | 'title'
  | 'spare'
  | 'modulePosition'
  | 'typeName'
  | 'targetVolts'
  | 'toleranceVolts'
  | 'restChecks'
  | 'readyAt'
  | 'createdAt'
>;

/** How numbers and times are written; instants are epoch ms. */
export interface LabelForms {
  /** '3.966' */
  voltsNumber: (volts: number) => string;
  /** '3.966 V' */
  volts: (volts: number) => string;
  /** '±5 mV' */
  tolerance: (volts: number) => string;
  /** 'Tue 9 June' */
  date: (at: number) => string;
  /** '14:31' */
  clock: (at: number) => string;
}

/** Why no label is printed; null: it may be. Out of tolerance is never printed. */
export function noLabelReason(charge: Pick<Labelled, 'stage' | 'restChecks'>): string | null {
  const last = charge.restChecks.at(-1);
  if (charge.stage !== 'ready' && charge.stage !== 'fitted')
    return 'A label says that a module is ready. This one is not checked and in tolerance.';
  if (!last?.verdict.within) return 'The last check was outside the tolerance: there is no label for it.';
  return null;
}

/** When the module was found ready, epoch ms. */
export const labelledAt = (charge: Pick<Labelled, 'restChecks' | 'readyAt' | 'createdAt'>): number =>
  Date.parse(charge.restChecks.at(-1)?.at ?? charge.readyAt ?? charge.createdAt);

/** Every word of the label; the volts are those of the check, without the meter's offset. */
export function labelOf(charge: Labelled, forms: LabelForms): LabelInput {
  const check = charge.restChecks.at(-1);
  const at = labelledAt(charge);
  return {
    title: charge.title,
    spare: charge.spare.label,
    position: charge.modulePosition === null ? null : `module ${charge.modulePosition}`,
    line: `${charge.typeName}, to ${forms.volts(charge.targetVolts)} ${forms.tolerance(charge.toleranceVolts)}`,
    volts: (check?.verdict.groups ?? []).map((group) => forms.voltsNumber(group.volts)),
    ready: `ready ${forms.date(at)} ${forms.clock(at)}${check ? `, ${check.by.name.split(' ')[0]}` : ''}`,
  };
}
