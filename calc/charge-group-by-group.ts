import { chargeThroughTerminals } from './charge-through-terminals';
import { CalcInputError } from './errors';
import { requirePositive } from './require';
import { validateGroups, validateSource } from './step/validate-step';
import type { CellGroup, GroupByGroupResult, Source, StepInput, StepOptions, StepResult } from './types';

/**
 * Each group by itself on a single-group channel: the longest first, each to the channel that would have it done
 * soonest. `totalS` is when the last channel is done with its currents.
 *
 * `stop` and `linkResistanceOhm` count for each group by itself; `settledVolts` is for the module, each group gets its
 * share. A group that cannot reach the stop on any channel has that outcome and takes no time.
 *
 * @throws CalcInputError for input that cannot be
 */
export function chargeGroupByGroup(
  input: Omit<StepInput, 'source'> & { sources: Source[] },
  options?: StepOptions,
): GroupByGroupResult {
  const { sources, ...shared } = input;
  if (!Array.isArray(sources) || sources.length === 0)
    throw new CalcInputError('sources', sources, 'a list of one or more');
  validateGroups('groups', input.groups);
  sources.forEach((source, i) => validateSource(`sources[${i}]`, source, input.direction));
  requirePositive('settledVolts', input.settledVolts);

  const settledVolts = input.settledVolts / input.groups.length;
  const kinds = sources.map((source) => sources.findIndex((other) => sameSource(other, source)));
  const charge = (group: CellGroup, source: Source) =>
    chargeThroughTerminals({ ...shared, groups: [group], source, settledVolts }, options);
  const onChannel: StepResult[][] = input.groups.map((group) => {
    const results: StepResult[] = [];
    kinds.forEach((kind, c) => results.push(kind < c ? results[kind]! : charge(group, sources[c]!)));
    return results;
  });

  const shortest = (i: number) => Math.min(...onChannel[i]!.map((result) => durationOf(result)));
  const order = input.groups.map((_, i) => i).sort((a, b) => finite(shortest(b)) - finite(shortest(a)) || a - b);
  const busyS = sources.map(() => 0);
  const groups: StepResult[] = new Array<StepResult>(input.groups.length);
  for (const i of order) {
    let best = 0;
    onChannel[i]!.forEach((result, c) => {
      if (busyS[c]! + durationOf(result) < busyS[best]! + durationOf(onChannel[i]![best]!)) best = c;
    });
    groups[i] = onChannel[i]![best]!;
    busyS[best]! += groups[i]!.stopAtS;
  }
  return {
    totalS: Math.max(...busyS),
    ampHours: groups.reduce((sum, result) => sum + result.ampHours, 0),
    wattHours: groups.reduce((sum, result) => sum + result.wattHours, 0),
    groups,
  };
}

function durationOf(result: StepResult): number {
  return result.outcome === 'unreachable' ? Infinity : result.stopAtS;
}

function finite(value: number): number {
  return Number.isFinite(value) ? value : 0;
}

function sameSource(a: Source, b: Source): boolean {
  return (
    a.maxAmps === b.maxAmps &&
    a.setVolts === b.setVolts &&
    a.maxWatts === b.maxWatts &&
    a.leadResistanceOhm === b.leadResistanceOhm &&
    a.heldGroupVolts === b.heldGroupVolts &&
    a.loadOhm === b.loadOhm
  );
}
