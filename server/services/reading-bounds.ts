/** What a reading can show at the most, typed or out of a file; above it a point or a unit is wrong. */

/** Amps beyond this many times the planned are a slip. */
export const MOST_TIMES_PLANNED = 2;
/** What a group can show beyond its limit while current flows, V. */
export const UNDER_CURRENT_OVER_LIMIT_VOLTS = 0.5;
/** A supply shows a little more than it is rated for. */
export const SUPPLY_SLACK = 1.05;
