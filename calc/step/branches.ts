import { compileCurve, type CompiledCurve } from '../curve/compiled-curve';
import type { CellGroup, OcvTable } from '../types';

/** +1: the current lifts the rest voltages (charging); −1: it lowers them. */
export type Sense = 1 | -1;

/** Groups on one side of the loop and what the current does to them. */
export interface LoopPart {
  groups: CellGroup[];
  curve: OcvTable;
  /** +1: the current charges these groups; −1: it discharges them. */
  sense: Sense;
  /** +1: their voltage adds to the loop's; −1: it stands against it. */
  side: Sense;
  /** Share of the charge that stays; 1 while discharging. */
  efficiency: number;
}

/** Groups that are alike in everything, as one of them and a count. */
export interface Branch {
  group: CellGroup;
  part: LoopPart;
  curve: CompiledCurve;
  count: number;
}

/** Takes equal groups of a part together, so that a module of eight alike costs one. */
export function mergeAlike(parts: LoopPart[]): { branches: Branch[]; branchOfGroup: number[] } {
  const branches: Branch[] = [];
  const branchOfGroup: number[] = [];
  for (const part of parts) {
    const curve = compileCurve(part.curve);
    for (const group of part.groups) {
      let b = branches.findIndex((other) => other.part === part && sameGroup(other.group, group));
      if (b < 0) b = branches.push({ group, part, curve, count: 0 }) - 1;
      branches[b]!.count++;
      branchOfGroup.push(b);
    }
  }
  return { branches, branchOfGroup };
}

function sameGroup(a: CellGroup, b: CellGroup): boolean {
  return (
    a === b ||
    (a.restVolts === b.restVolts &&
      a.capacityAh === b.capacityAh &&
      a.ohmicResistanceOhm === b.ohmicResistanceOhm &&
      a.polarisationResistanceOhm === b.polarisationResistanceOhm &&
      a.polarisationTimeConstantS === b.polarisationTimeConstantS &&
      (a.polarisationVolts ?? 0) === (b.polarisationVolts ?? 0))
  );
}
