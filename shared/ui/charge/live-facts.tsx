import { isProven, type LiveScreenProps } from './live-props';
import { LiveLevels } from './live-levels';
import { ReadyPanel } from './ready-panel';

/** The groups with their target; once proven, how far off they are. */
export const LiveFacts = ({
  charge,
  lagLimitVolts,
  stacked = false,
}: Pick<LiveScreenProps, 'charge' | 'lagLimitVolts'> & { stacked?: boolean }) =>
  isProven(charge) && charge.restChecks.length > 0 ? (
    <ReadyPanel charge={charge} stacked={stacked} />
  ) : (
    <LiveLevels charge={charge} lagLimitVolts={lagLimitVolts} stacked={stacked} />
  );
