import type { TextTone } from '../primitives/txt';
import { Txt } from '../primitives/txt';

/** A figure is stale when it is older than twice the interval it should come in. Both in seconds. */
export const isStale = (ageS: number, intervalS: number): boolean => ageS > 2 * intervalS;

/** The tone a live figure takes. */
export const freshTone = (stale: boolean, fresh: TextTone = 'ink'): TextTone => (stale ? 'ink3' : fresh);

/** 'no reading since 12:50', beside every stale figure. */
export const StaleNote = ({ since, what = 'reading' }: { since: string; what?: string }) => (
  <Txt kind="small" tone="ink2" nowrap>{`no ${what} since ${since}`}</Txt>
);
