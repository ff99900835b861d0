import { useState } from 'react';
import { sentenceOf } from '@/shared/client/api-problem';
import { usePassAlert } from '@/shared/client/alerts';
import { useAcceptProposal, useUndoBenchChange } from '@/shared/client/bench-plan';
import { useTakeWork } from '@/shared/client/work';
import type { BenchChangeDto, FitDto } from '@/shared/contract/bench-plan';
import { useToast } from '@/shared/ui/primitives/toast';

/**
 * What is done from the side column: take a proposal, give a piece of work, give an alarm to somebody, take a change back.
 *
 * @param renew somebody else was first: read the plan again
 */
export function useActs(renew: () => void) {
  const toast = useToast();
  const accept = useAcceptProposal();
  const undo = useUndoBenchChange();
  const take = useTakeWork();
  const pass = usePassAlert();
  const [given, setGiven] = useState<string | null>(null);
  const [gaveProblem, setGaveProblem] = useState<{ workId: string; text: string } | null>(null);

  const takeBack = (change: BenchChangeDto) =>
    undo.mutate(change.id, {
      onSuccess: () => toast({ text: `Taken back: ${change.text}` }),
      onError: renew,
    });
  /** Says what was done, with the way back. */
  const done = (change: BenchChangeDto) => {
    undo.reset();
    toast({ text: change.text, action: { title: 'Undo', onPress: () => takeBack(change) } });
  };
  return {
    done,
    takeBack,
    undoBusy: undo.isPending,
    undoProblem: undo.isError ? sentenceOf(undo.error) : null,
    takePlan: (proposalId: string) => accept.mutate(proposalId, { onSuccess: done, onError: renew }),
    takeBusy: accept.isPending,
    takeProblem: accept.isError ? sentenceOf(accept.error) : null,
    give: (fit: FitDto, personId: string, name: string) => {
      if (!fit.span) return;
      setGiven(fit.work.id);
      setGaveProblem(null);
      take.mutate(
        {
          id: fit.work.id,
          personId,
          from: fit.span.from,
          ...(fit.work.splittable ? { minutes: fit.minutes } : {}),
        },
        {
          onSuccess: () => toast({ text: `${fit.work.title} is ${name}’s.` }),
          onError: (error) => {
            setGaveProblem({ workId: fit.work.id, text: sentenceOf(error) });
            renew();
          },
          onSettled: () => setGiven(null),
        },
      );
    },
    giving: given,
    gaveProblem,
    passAlert: (id: string, personId: string) => pass.mutate({ id, personId }),
    passBusy: pass.isPending,
    passProblem: pass.isError ? sentenceOf(pass.error) : null,
  };
}
export type Acts = ReturnType<typeof useActs>;
