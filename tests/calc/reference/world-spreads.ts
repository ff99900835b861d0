import { LIVE_SPREADS } from '@/calc/live/live-spreads';
import { CAPACITY_RELATIVE_SD, DEFAULT_SPREADS, RESISTANCE_RELATIVE_SD } from '@/calc/plan/default-spreads';
import type { PlanInput } from '@/calc/plan-types';
import type { WorldSpreads } from './worlds';

/** What the code says of its own doubts, for the worlds to be drawn from. */
export function spreadsOf(plan: PlanInput): WorldSpreads {
  return {
    capacityRelative: CAPACITY_RELATIVE_SD[plan.spare.capacitySource],
    resistanceRelative: RESISTANCE_RELATIVE_SD[plan.module.resistanceKind],
    currentRelative: DEFAULT_SPREADS.currentRelative,
    meterVolts: DEFAULT_SPREADS.meterVolts,
    readingVolts: DEFAULT_SPREADS.readingVolts,
    targetVolts: DEFAULT_SPREADS.targetVolts,
    chargerVolts: plan.channels[0]!.offsetSdVolts!,
    curveVolts: DEFAULT_SPREADS.curveVolts,
    temperatureCelsius: DEFAULT_SPREADS.temperatureCelsius,
    leadRelative: LIVE_SPREADS.leadRelative,
    terminalVolts: LIVE_SPREADS.terminalVolts,
    ammeterRelative: LIVE_SPREADS.ammeterRelative,
    ammeterAmps: LIVE_SPREADS.ammeterAmps,
    modelRelative: LIVE_SPREADS.modelRelative,
    modelVolts: LIVE_SPREADS.modelVolts,
    modelSoc: LIVE_SPREADS.modelSoc,
    modelCorrelationSoc: LIVE_SPREADS.modelCorrelationSoc,
  };
}
