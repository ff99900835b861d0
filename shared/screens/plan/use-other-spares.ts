import { usePlans } from '@/shared/client/plans';
import type { PlanRequest } from '@/shared/contract/plan';
import type { SpareDto } from '@/shared/contract/spare';
import { useFormats } from '@/shared/ui/format/formats';
import { bestOption } from '@/shared/ui/plan/best-option';
import { readBeforeWords, ruledOutWords } from '@/shared/ui/spare/spare-words';

/** Other spares that are reckoned where this one is refused. */
const mostOthers = 3;

/** Spares of the same type on the shelf, reckoned to the same target, the soonest first. */
export function useOtherSpares(
  spare: SpareDto | null,
  request: PlanRequest | null,
  all: readonly SpareDto[] | undefined,
) {
  const { marks } = useFormats();
  const candidates =
    spare && request
      ? (all ?? [])
          .filter(
            (other) =>
              other.id !== spare.id &&
              other.moduleTypeId === spare.moduleTypeId &&
              other.where === 'shelf' &&
              ruledOutWords(other, marks) === null &&
              readBeforeWords(other) === null,
          )
          .slice(0, mostOthers)
      : [];
  const plans = usePlans(request ? candidates.map((other) => ({ ...request, spareId: other.id })) : []);
  const likely = (index: number) => {
    const dto = plans[index]?.data;
    return (dto && bestOption(dto.plan)?.totalS.p50) ?? Number.POSITIVE_INFINITY;
  };
  return candidates
    .map((other, index) => ({ spare: other, dto: plans[index]?.data ?? null, likely: likely(index) }))
    .sort((a, b) => a.likely - b.likely);
}
