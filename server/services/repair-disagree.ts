import { conflict } from '../errors/domain-error';
import { repairBlock } from './repair-block';
import type { RepairFacts } from './repair-facts';
import type { RepairFile } from './repair-file';

/** Nothing is ordered, taken or lifted out while pack and meter disagree. @throws DomainError 409 */
export function refuseDisagree(file: RepairFile, facts: RepairFacts): void {
  if (!facts.disagree) return;
  const block = repairBlock(file, facts);
  const who = block?.role === null ? 'Decide' : 'A foreman or manager decides';
  throw conflict('sources_disagree', `${block?.text ?? 'The two sources disagree.'} ${who} before it goes on.`);
}
