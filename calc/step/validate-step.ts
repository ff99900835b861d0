import { CalcInputError } from '../errors';
import { isGiven, requireFinite, requireNotNegative, requirePositive, requirePositiveOrNull } from '../require';
import type { CellGroup, Direction, Source, StepInput, StepStop } from '../types';

/** @throws CalcInputError naming the first field that cannot be */
export function validateStep(input: StepInput): void {
  validateGroups('groups', input.groups);
  requireNotNegative('linkResistanceOhm', input.linkResistanceOhm);
  validateEfficiency('coulombicEfficiency', input.coulombicEfficiency);
  if (input.direction !== 'charge' && input.direction !== 'discharge')
    throw new CalcInputError('direction', input.direction, "'charge' or 'discharge'");
  validateSource('source', input.source, input.direction);
  validateStop(input.stop);
  requirePositive('settledVolts', input.settledVolts);
}

export function validateGroups(field: string, groups: CellGroup[]): void {
  if (!Array.isArray(groups) || groups.length === 0) throw new CalcInputError(field, groups, 'a list of one or more');
  groups.forEach((group, i) => {
    const at = `${field}[${i}]`;
    requirePositive(`${at}.capacityAh`, group.capacityAh);
    requireNotNegative(`${at}.ohmicResistanceOhm`, group.ohmicResistanceOhm);
    requireNotNegative(`${at}.polarisationResistanceOhm`, group.polarisationResistanceOhm);
    const over = requireFinite(`${at}.polarisationVolts`, group.polarisationVolts ?? 0);
    if (group.polarisationResistanceOhm > 0 || over !== 0)
      requirePositive(`${at}.polarisationTimeConstantS`, group.polarisationTimeConstantS);
    else requireNotNegative(`${at}.polarisationTimeConstantS`, group.polarisationTimeConstantS);
    requireFinite(`${at}.restVolts`, group.restVolts);
  });
}

export function validateEfficiency(field: string, efficiency: number): void {
  if (!(efficiency > 0 && efficiency <= 1)) throw new CalcInputError(field, efficiency, 'above 0 and at most 1');
}

export function validateSource(field: string, source: Source, direction: Direction): void {
  requirePositiveOrNull(`${field}.maxAmps`, source.maxAmps);
  requirePositiveOrNull(`${field}.setVolts`, source.setVolts);
  requirePositiveOrNull(`${field}.maxWatts`, source.maxWatts);
  requirePositiveOrNull(`${field}.heldGroupVolts`, source.heldGroupVolts);
  requireNotNegative(`${field}.leadResistanceOhm`, source.leadResistanceOhm);
  if (isGiven(source.loadOhm)) {
    requirePositive(`${field}.loadOhm`, source.loadOhm);
    if (direction === 'charge') throw new CalcInputError(`${field}.loadOhm`, source.loadOhm, 'empty for a charge');
  }
  const { maxAmps, setVolts, maxWatts, heldGroupVolts, loadOhm } = source;
  if ([maxAmps, setVolts, maxWatts, heldGroupVolts, loadOhm].every((limit) => !isGiven(limit)))
    throw new CalcInputError(`${field}.maxAmps`, null, 'given where nothing else limits the current');
}

export function validateStop(stop: StepStop): void {
  requireNotNegative('stop.toleranceVolts', stop.toleranceVolts);
  if (isGiven(stop.relaxedVolts)) requireFinite('stop.relaxedVolts', stop.relaxedVolts);
  const groupRelaxed = stop.groupRelaxedVolts ?? null;
  if (groupRelaxed !== null) requireFinite('stop.groupRelaxedVolts', groupRelaxed);
  if (isGiven(stop.cutoffAmps)) requireNotNegative('stop.cutoffAmps', stop.cutoffAmps);
  if (isGiven(stop.groupVolts)) requireFinite('stop.groupVolts', stop.groupVolts);
  const cap = stop.maxSeconds ?? null;
  if (cap !== null) requireNotNegative('stop.maxSeconds', cap);
  if ([stop.relaxedVolts, groupRelaxed, stop.cutoffAmps, stop.groupVolts, cap].every((value) => !isGiven(value)))
    throw new CalcInputError('stop', null, 'a target, an end current, a group limit or a time cap');
}
