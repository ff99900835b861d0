/** Ways on to the plan screen, with what is known filled in. */
import type { ChargePlan, PlanOption } from '@/calc/plan-types';
import type { ChargeDto } from '@/shared/contract/charge';

type Known = Record<string, string | number | null>;

function planPath(known: Known): string {
  const query = Object.entries(known)
    .filter((entry): entry is [string, string | number] => entry[1] !== null)
    .map(([name, value]) => `${name}=${encodeURIComponent(String(value))}`)
    .join('&');
  return `/plan?${query}`;
}

const targetOf = (charge: ChargeDto): Known => ({
  ...(charge.targetSoc === null ? { target: charge.targetTypedVolts } : { soc: charge.targetSoc }),
  repair: charge.repairRef,
  position: charge.modulePosition,
  meter: charge.meterId,
  celsius: charge.targetCelsius,
  tolerance: Math.round(charge.toleranceVolts * 1e6) / 1e3,
});

/** The same spare to the same target again, from where the check found it. */
export const topUpPath = (charge: ChargeDto): string =>
  planPath({ spare: charge.spare.id, topUpOf: charge.id, ...targetOf(charge) });

/** The same spare from what it reads now, or on another channel or way: in place of this charge, which is not begun. */
export const replanPath = (charge: ChargeDto): string =>
  planPath({ spare: charge.spare.id, insteadOf: charge.id, ...targetOf(charge) });

/** Another spare to the same target. */
export const otherSparePath = (charge: ChargeDto): string => planPath(targetOf(charge));

/** The same as what the server is asked: how long a top-up takes from the check's own voltages. */
export const topUpRequest = (charge: ChargeDto) => ({
  spareId: charge.spare.id,
  targetVolts: charge.targetSoc === null ? charge.targetTypedVolts : null,
  ...(charge.targetSoc === null ? {} : { targetSoc: charge.targetSoc }),
  toleranceMillivolts: Math.round(charge.toleranceVolts * 1e6) / 1e3,
  meterId: charge.meterId,
  packCelsius: charge.targetCelsius,
  readyBy: null,
  clipOnAt: null,
  repairRef: charge.repairRef,
  modulePosition: charge.modulePosition,
});

/** The soonest way that ends within the tolerance, or why there is none; both null while it is reckoned. */
export function soonestTopUp(plan: ChargePlan | undefined): { option: PlanOption | null; ruledOut: string | null } {
  if (!plan) return { option: null, ruledOut: null };
  const option = plan.options.find((one) => one.soonest) ?? plan.options.find((one) => one.withinTolerance) ?? null;
  if (option) return { option, ruledOut: null };
  return {
    option: null,
    ruledOut: plan.refusals[0]?.text ?? 'No free way brings all groups inside at once. The plan shows what there is.',
  };
}
