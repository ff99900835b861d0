import type { Caution, PlanOption } from '../plan-types';
import type { Draft } from './draft';
import { leadOhmOf } from './leads';
import type { PlanModel } from './plan-model';
import { ampsText, durationText, groupText, millivoltsText } from './words';

/** Current above which a caution is given where the workshop has no limit of its own, C. Common practice. */
const RATE_LIMIT_C = 0.5;
/** Drop over the leads that the charger does not see, V a group: from here on a taper takes hours more. */
const LEAD_DROP_VOLTS = 0.005;

/** What to know about one way, beside what its draft has found. */
export function optionCautions(model: PlanModel, draft: Draft, option: PlanOption): Caution[] {
  const found: Caution[] = [...draft.cautions];
  const add = (code: Caution['code'], text: string): void => {
    if (!found.some((caution) => caution.code === code)) found.push({ code, text });
  };
  const { workshop } = model.input;
  const bulk = draft.steps.filter((step) => step.kind === 'bulk');
  const count = model.groups.length;

  if (draft.busbarsOff)
    add('busbars-off', 'Busbars come off. Open groups have no fuse between them: insulated tools, one pole at a time.');

  const apart = endsApart(model, draft, option);
  if (apart !== null) add('ends-apart', apart.text);

  const share = draft.way === 'paralleled' ? count : 1;
  const limitC = workshop.rateLimitC ?? RATE_LIMIT_C;
  const capacity = Math.min(...model.groups.map((group) => group.capacityAh));
  const rate = draft.amps / share / capacity;
  if (rate > limitC + 1e-9)
    add(
      'high-rate',
      `${ampsText(draft.amps)} is ${rate.toFixed(2)}\u00a0C for a group of ${capacity.toFixed(1)}\u00a0Ah. Over ${limitC}\u00a0C watch its temperature.`,
    );

  const closes = workshop.closesInS;
  const endsS = model.input.clipOnAtS + option.totalS.p50 - option.restS - workshop.checkS;
  if (closes !== null && endsS > closes)
    add(
      'unattended',
      `Current flows ${durationText(endsS - closes)} past closing. A charge is not left alone: start earlier, or have someone stay.`,
    );

  const blind = bulk.find((step) => step.setVolts === null && step.way !== 'resistor');
  if (blind)
    add(
      'no-adjustable-volts',
      `${blind.channel?.name ?? 'The load'} does not stop by itself at a voltage. Stay with it and stop it by the ampere-hours.`,
    );
  else if (draft.way === 'resistor')
    add(
      'no-adjustable-volts',
      'A resistor does not stop by itself. Take it off by the ampere-hours, and look in often.',
    );

  if (draft.finish === 'on-the-mark') {
    const thin = bulk.find(
      (step) =>
        step.channel !== null &&
        step.channel.senses === 'own-terminals' &&
        (draft.amps * leadOhmOf(step.channel)) / step.groupsAcross > LEAD_DROP_VOLTS,
    );
    if (thin?.channel)
      add(
        'thin-leads',
        `The leads of ${thin.channel.name} drop ${thin.channel.leadsMeasured === false ? 'perhaps ' : ''}${millivoltsText(draft.amps * leadOhmOf(thin.channel))} at ${ampsText(draft.amps)}, which the charger takes for the module's. The taper takes longer for it.${thin.channel.leadsMeasured === false ? ' Measure them to narrow the band.' : ''}`,
      );
    const unchecked = bulk.find((step) => step.channel !== null && step.channel.offsetSdVolts === null);
    if (unchecked?.channel)
      add(
        'meter-unchecked',
        `The voltmeter of ${unchecked.channel.name} was never compared with the workshop's. It decides where this ends: check the volts with the hand meter.`,
      );
  }
  return found;
}

/** That groups end outside the tolerance or far apart inside it, in the draft's own words where it has some; null: they do not. */
export function endsApart(
  model: PlanModel,
  draft: Draft,
  {
    withinTolerance,
    endGroupVolts,
    endSpreadVolts,
  }: Pick<PlanOption, 'withinTolerance' | 'endGroupVolts' | 'endSpreadVolts'>,
): Caution | null {
  const code = 'ends-apart';
  const own = draft.cautions.find((caution) => caution.code === code);
  if (own) return own;
  if (!withinTolerance) {
    const worst = worstGroup(model, endGroupVolts);
    const side = endGroupVolts[worst]! < model.targetVolts ? 'under' : 'over';
    const off = millivoltsText(endGroupVolts[worst]! - model.targetVolts);
    return { code, text: `${groupText(worst)} ends ${off} ${side} the target, outside.` };
  }
  if (endSpreadVolts <= model.toleranceVolts) return null;
  const inside = millivoltsText(model.toleranceVolts);
  return { code, text: `Ends ${millivoltsText(endSpreadVolts)} apart, just inside ±${inside}.` };
}

function worstGroup(model: PlanModel, endGroupVolts: number[]): number {
  const off = endGroupVolts.map((volts) => Math.abs(volts - model.targetVolts));
  return off.indexOf(Math.max(...off));
}
