import type { ChargePlan, PlanOption } from '@/calc/plan-types';

/** The way that is chosen until somebody chooses: in time and within the tolerance, with the busbars left alone where that can be. */
export function bestOption({ options }: Pick<ChargePlan, 'options'>): PlanOption | null {
  const fitting = options.filter((option) => option.withinTolerance && !option.tooLate);
  const within = options.filter((option) => option.withinTolerance);
  return (
    fitting.find((option) => option.soonestBusbarsStay) ??
    fitting.find((option) => !option.busbarsOff) ??
    fitting[0] ??
    within[0] ??
    options[0] ??
    null
  );
}
