import type { BenchAlternative, BenchProblem, Stretch } from './bench-types';
import { CalcInputError } from '../errors';
import { requireFinite, requireNotNegative, requirePositive } from '../require';

/** @throws CalcInputError for a problem that no plan can be made of, with the field that is wrong */
export function checkBench({ taken, jobs }: BenchProblem): void {
  taken.forEach((list, at) => checkStretches(`taken[${at}]`, list));
  const ids = new Set<string>();
  jobs.forEach(({ id, dueS, weight, alternatives }, at) => {
    if (ids.has(id)) throw new CalcInputError(`jobs[${at}].id`, id, 'different from the others');
    ids.add(id);
    if (dueS !== null) requireFinite(`jobs[${at}].dueS`, dueS);
    requireNotNegative(`jobs[${at}].weight`, weight);
    alternatives.forEach((one, place) => checkAlternative(`jobs[${at}].alternatives[${place}]`, one, taken.length));
  });
}

function checkAlternative(field: string, one: BenchAlternative, channels: number): void {
  const { channels: held } = one;
  const known = held.every((channel) => Number.isInteger(channel) && channel >= 0 && channel < channels);
  if (held.length === 0 || !known || new Set(held).size < held.length)
    throw new CalcInputError(`${field}.channels`, held, `one channel or more of 0 to ${channels - 1}, each once`);
  requirePositive(`${field}.busyS`, one.busyS);
  requireNotNegative(`${field}.readyS`, one.readyS);
  requireNotNegative(`${field}.guardS`, one.guardS);
  checkStretches(`${field}.mayStart`, one.mayStart);
}

/** @throws CalcInputError unless each ends after it begins and begins no earlier than the one before ends */
export function checkStretches(field: string, list: readonly Stretch[]): void {
  let before = -Infinity;
  list.forEach(({ fromS, toS }, at) => {
    if (!(toS > fromS)) throw new CalcInputError(`${field}[${at}].toS`, toS, 'after it begins');
    if (!(fromS >= before)) throw new CalcInputError(`${field}[${at}].fromS`, fromS, 'after the stretch before it');
    before = toS;
  });
}
