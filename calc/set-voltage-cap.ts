import { isBeyondCurve } from './curve/ocv';
import { requireFinite } from './require';
import { coulombsToGroupVolts } from './step/reach';
import { SeriesLoop } from './step/series-loop';
import { validateEfficiency, validateGroups } from './step/validate-step';
import type { CellGroup, Direction, OcvTable } from './types';

export interface SetVoltageCap {
  /** Highest safe set voltage (discharging: lowest), V over the module. */
  volts: number;
  /** Rest voltage of each group at that state, V. */
  groupVolts: number[];
  /** 0-based group that is at its limit there. */
  limitingGroup: number;
  /** Charge through the terminals from the start to there, Ah; below 0 where a group is already past its limit. */
  ampHours: number;
  /** Some group gets there on the straight extension of the curve. */
  beyondCurve: boolean;
}

/**
 * The set voltage at which a forgotten supply does no harm: the sum of all groups' rest voltages in the state in which
 * the first of them rests at its limit, all groups moved by the same ampere-hours. A supply held at it brings the
 * current to nothing exactly there. (A difference taken from the start would not be safe, since it can grow.)
 *
 * @param limitVolts of each group: the highest (charging) or lowest (discharging) rest voltage
 * @throws CalcInputError for input that cannot be
 */
export function setVoltageCap(input: {
  groups: CellGroup[];
  curve: OcvTable;
  limitVolts: number;
  direction: Direction;
  coulombicEfficiency?: number;
}): SetVoltageCap {
  const { groups, curve, limitVolts, direction } = input;
  validateGroups('groups', groups);
  requireFinite('limitVolts', limitVolts);
  validateEfficiency('coulombicEfficiency', input.coulombicEfficiency ?? 1);
  const sense = direction === 'charge' ? 1 : -1;
  const efficiency = direction === 'charge' ? (input.coulombicEfficiency ?? 1) : 1;
  const loop = new SeriesLoop([{ groups, curve, sense, side: 1, efficiency }]);
  const { coulombs, branch } = coulombsToGroupVolts(loop, limitVolts);
  const groupVolts = loop.branchOfGroup.map((b) => loop.branchVolts(b, coulombs));
  return {
    volts: groupVolts.reduce((sum, volts) => sum + volts, 0),
    groupVolts,
    limitingGroup: loop.branchOfGroup.indexOf(branch),
    ampHours: coulombs / 3600,
    beyondCurve: groupVolts.some((volts) => isBeyondCurve(curve, volts)),
  };
}
