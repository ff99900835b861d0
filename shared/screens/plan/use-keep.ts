import { useRouter, type Href } from 'expo-router';
import { isConflict, isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useQueueCharge } from '@/shared/client/charges';
import { useKeepPlan } from '@/shared/client/plans';
import { useToast } from '@/shared/ui/primitives/toast';
import type { PlanPage } from './use-plan-page';

/** Keeps the chosen way as a charge: for the checks now, or for later, then in the queue where a time is typed. */
export function useKeep({ topUpOf, insteadOf, request, chosen, plan, tryAll, setOpen, clearDraft }: PlanPage) {
  const router = useRouter();
  const toast = useToast();
  const keep = useKeepPlan();
  const queue = useQueueCharge();

  const send = async (then: 'checks' | 'later') => {
    tryAll();
    if (!request || !chosen) return setOpen(true);
    const charge = await keep
      .mutateAsync({ ...request, optionId: chosen.id, topUpOf, insteadOf })
      .catch((error: unknown) => {
        // The channel or the spare was taken meanwhile: the ways are reckoned anew, what is typed stays.
        if (isConflict(error) || (isProblem(error) && error.status === 422)) void plan.refetch();
        return null;
      });
    if (charge === null) return;
    clearDraft();
    if (then === 'checks') return router.replace(`/charges/${charge.id}/checks` as Href);
    if (request.clipOnAt !== null)
      await queue
        .mutateAsync({ id: charge.id, rev: charge.rev, clipOnAt: request.clipOnAt })
        .catch((error: unknown) => toast({ text: `${charge.number} is kept, but not queued: ${sentenceOf(error)}` }));
    router.replace(`/charges/${charge.id}` as Href);
  };

  return {
    send: (then: 'checks' | 'later') => void send(then),
    busy: keep.isPending || queue.isPending,
    error: keep.error,
    /** Takes the last refusal away: something was changed since. */
    reset: keep.reset,
    /** The charge that holds the spare already, as the refusal names it. */
    holder: holderOf(keep.error, (id) => router.push(`/charges/${id}` as Href)),
  };
}

export type Keep = ReturnType<typeof useKeep>;

function holderOf(error: unknown, open: (chargeId: string) => void) {
  if (!isConflict(error)) return null;
  const present = error.present as { chargeId?: string; title?: string } | undefined;
  const { chargeId, title } = present ?? {};
  return chargeId && title ? { title, onOpen: () => open(chargeId) } : null;
}
