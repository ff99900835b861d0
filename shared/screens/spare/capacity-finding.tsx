import { isConflict, sentenceOf } from '@/shared/client/api-problem';
import { useAnswerCapacity } from '@/shared/client/spares';
import type { SpareDto } from '@/shared/contract/spare';
import { ampHours } from '@/shared/ui/format/quantities';
import { useFormats } from '@/shared/ui/format/formats';
import { useToast } from '@/shared/ui/primitives/toast';
import { CapacityFound } from '@/shared/ui/spare/capacity-found';

/** The newest finding of a charge that waits for an answer; nothing where none does. */
export function CapacityFinding({
  spare,
  now,
  offline,
  onOpenCharge,
  onStale,
}: {
  spare: SpareDto;
  now: number;
  offline: boolean;
  onOpenCharge: (id: string) => void;
  /** Somebody else was first: read the spare again. */
  onStale: () => void;
}) {
  const toast = useToast();
  const { marks } = useFormats();
  const answer = useAnswerCapacity();
  const found = spare.capacities.find(({ state }) => state === 'found');
  if (!found) return null;
  return (
    <CapacityFound
      spare={spare}
      found={found}
      now={now}
      offline={offline}
      busy={answer.isPending}
      problem={answer.error ? sentenceOf(answer.error) : null}
      onOpenCharge={onOpenCharge}
      onAnswer={(said) =>
        answer.mutate(
          { id: spare.id, rev: spare.rev, capacityId: found.id, answer: said },
          {
            onSuccess: (saved) =>
              toast({
                text:
                  said === 'take'
                    ? `Plans go by ${ampHours(saved.usedCapacityAh, marks)} now.`
                    : `Plans go on with ${ampHours(saved.usedCapacityAh, marks)}. The finding stays in the list.`,
              }),
            onError: (error) => isConflict(error) && onStale(),
          },
        )
      }
    />
  );
}
