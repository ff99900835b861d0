import type { FillProblem, FillWindow } from './bench-types';
import { checkStretches } from './check-bench';
import { CalcInputError } from '../errors';
import { requireFinite, requireNotNegative, requirePositive } from '../require';

/** @throws CalcInputError for a problem that no plan can be made of, with the field that is wrong */
export function checkFills({ windows, work, placesTaken, lookInS }: FillProblem): void {
  requireNotNegative('lookInS', lookInS);
  windows.forEach(({ fromS, toS, lookInsS }, at) => {
    requireFinite(`windows[${at}].fromS`, fromS);
    requireFinite(`windows[${at}].toS`, toS);
    if (!(toS > fromS)) throw new CalcInputError(`windows[${at}].toS`, toS, 'after it begins');
    lookInsS.forEach((one, place) => requireFinite(`windows[${at}].lookInsS[${place}]`, one));
  });
  checkApart(windows);
  const ids = new Set<string>();
  work.forEach((one, at) => {
    if (ids.has(one.id)) throw new CalcInputError(`work[${at}].id`, one.id, 'different from the others');
    ids.add(one.id);
    requireNotNegative(`work[${at}].likelyS`, one.likelyS);
    requirePositive(`work[${at}].longS`, one.longS);
    requireNotNegative(`work[${at}].weight`, one.weight);
    requireFinite(`work[${at}].releaseS`, one.releaseS);
    if (one.dueS !== null) requireFinite(`work[${at}].dueS`, one.dueS);
    requireNotNegative(`work[${at}].leastPartS`, one.leastPartS);
  });
  for (const [placeId, list] of Object.entries(placesTaken)) checkStretches(`placesTaken.${placeId}`, list);
}

/** A person's windows are apart, or they would be asked to do two things at once. */
function checkApart(windows: readonly FillWindow[]): void {
  const overS = new Map<string, number>();
  for (const [at, { personId, fromS, toS }] of [...windows.entries()].sort(([, a], [, b]) => a.fromS - b.fromS)) {
    if (fromS < (overS.get(personId) ?? -Infinity))
      throw new CalcInputError(`windows[${at}].fromS`, fromS, "after this person's window before it");
    overS.set(personId, toS);
  }
}
