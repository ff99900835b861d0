/** The one thing to do next with a repair. Pure. */
import type { RepairPageDto } from '@/shared/contract/repair';
import { nextStep } from '../bench/next-step';
import { planHref } from '../repair-spare/candidate-words';
import { presentStep, standing } from './repair-words';

export type RepairSheet = 'hand-over' | 'removed' | 'delete' | 'wait' | 'set-aside' | 'fit';
export type RepairNext =
  | { kind: 'go'; title: string; path: string }
  | { kind: 'hand-over' | 'removed' | 'fit' | 'archive' | 'unarchive' | 'restore'; title: string };

/** @param mayDecide whether this person may decide between two sources */
export function nextOfRepair(repair: RepairPageDto, mayDecide: boolean): RepairNext {
  if (repair.state === 'deleted') return { kind: 'restore', title: 'Bring it back' };
  if (repair.state === 'archived') return { kind: 'unarchive', title: 'Take it out of the archive' };
  if (repair.state === 'handed-over') return { kind: 'archive', title: 'Put it into the archive' };
  const page = `/repairs/${repair.id}`;
  const go = (title: string, path: string): RepairNext => ({ kind: 'go', title, path });
  const { block, charge } = repair;
  if (block?.code === 'sources-disagree')
    return go(mayDecide ? 'Decide which module it is' : 'Look at the two sources', `${page}/second-source`);
  if (block?.code === 'module-condition') return { kind: 'removed', title: 'Record what became of the module' };
  if (block?.code === 'module-unknown') return go('Enter the second source', `${page}/second-source`);
  const step = presentStep(repair.steps)?.step ?? null;
  switch (step) {
    case 'read':
      return go('Read the pack', `${page}/reading`);
    case 'second-source':
      return go('Enter the second source', `${page}/second-source`);
    case 'target':
      return go('Take the target', `${page}/target`);
    case 'spare':
      return go('Choose a spare', `${page}/spares`);
    case 'charge': {
      if (!charge) {
        const asItIs = nextAsItIs(repair);
        if (asItIs) return asItIs;
        const plan = planHref(repair);
        return plan ? go('Plan a charge', plan) : go('Choose a spare', `${page}/spares`);
      }
      const next = nextStep(charge);
      return next ? go(next.title, next.path) : go('Open the charge', `/charges/${charge.id}`);
    }
    case 'fit': {
      const ready = repair.charges.find(({ stage }) => stage === 'ready') ?? charge;
      return ready ? go('Fit it, or print its label', `/charges/${ready.id}`) : go('Choose a spare', `${page}/spares`);
    }
    case 'prove':
      return standing(repair.readings).some(({ stage }) => stage !== 'arrival')
        ? go('Prove the repair', `${page}/prove`)
        : go('Read the pack after the fit', `${page}/reading`);
    case null:
      return { kind: 'hand-over', title: 'Hand it over' };
  }
}

/** Of a reserved spare that rests within the tolerance: fitting it, or reading it once more; null: it needs a charge. */
export function nextAsItIs({ spare, asItIs }: Pick<RepairPageDto, 'spare' | 'asItIs'>): RepairNext | null {
  if (spare === null || asItIs === null) return null;
  return asItIs.old
    ? { kind: 'go', title: `Read ${spare.label} once more`, path: `/spares/${spare.id}/reading` }
    : { kind: 'fit', title: `Fit ${spare.label} without a charge` };
}
