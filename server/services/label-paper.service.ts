import { labelledAt, labelOf, noLabelReason } from '@/shared/contract/label-words';
import type { PaperQuery } from '@/shared/contract/papers';
import type { Deps, Member } from '../deps';
import { conflict } from '../errors/domain-error';
import { drawLabel } from '../papers/label';
import type { Paper } from '../papers/page';
import { paperWords } from '../papers/paper-words';
import { findWorkshop } from '../repositories/charge-stock.repository';
import { charge } from './charges.service';

/**
 * The label of a proven module.
 * @param origin under which this server was asked: the code's address where the operator has set none
 * @throws DomainError 404; 409 with the reason where it is not in tolerance
 */
export async function labelPaper(
  deps: Deps,
  member: Member,
  id: string,
  query: PaperQuery,
  origin: string,
  now: number,
): Promise<Paper> {
  const found = await charge(deps, member, id, now);
  const why = noLabelReason(found);
  if (why !== null) throw conflict('no_label', why);
  const workshop = await findWorkshop(deps.dataSource.manager, member.workshopId);
  const at = labelledAt(found);
  const label = labelOf(found, paperWords(workshop?.zone ?? 'UTC', query.decimal ?? 'point', at));
  const url = URL.canParse(found.labelUrl, origin) ? new URL(found.labelUrl, origin).href : found.labelUrl;
  return { name: `label-${found.spare.label}.pdf`, bytes: await drawLabel(label, url, at) };
}
