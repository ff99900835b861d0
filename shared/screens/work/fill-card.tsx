import { lazy, Suspense, useState } from 'react';
import { useLink } from '@/shared/client/link';
import { useWorkActs } from '@/shared/client/work-acts';
import type { PlanBlockDto } from '@/shared/contract/bench-plan';
import { useToast } from '@/shared/ui/primitives/toast';
import { FillDock } from '@/shared/ui/work/fill-dock';

// It comes with the fields of a form, which the first screen does without.
const DoneSheet = lazy(() => import('@/shared/ui/work/done-sheet').then((part) => ({ default: part.DoneSheet })));

/** One's own fill with what can be done with it: begin, done, give back. */
export function FillCard({
  block,
  now,
  onGo,
  onStale,
}: {
  block: PlanBlockDto;
  now: number;
  onGo: (path: string) => void;
  /** After an act or a refusal: read the day again. */
  onStale: () => void;
}) {
  const toast = useToast();
  const offline = useLink().state === 'down';
  const acts = useWorkActs(onStale);
  const [ending, setEnding] = useState(false);
  const { workId, stint } = block;
  if (workId === null || stint === null) return null;
  const problem = acts.refused?.text ?? null;
  const said = (text: string) => () => {
    setEnding(false);
    toast({ text });
    onStale();
  };
  return (
    <>
      <FillDock
        block={block}
        now={now}
        busy={acts.busy}
        offline={offline}
        problem={ending ? null : problem}
        onOpen={() => onGo(`/work/${workId}`)}
        onBegin={() => acts.begin(workId, stint.id, said(`${block.title} is begun.`))}
        onDone={() => {
          acts.forget();
          setEnding(true);
        }}
        onGiveBack={() => acts.giveBack(workId, stint.id, said(`${block.title} is open again.`))}
      />
      {ending ? (
        <Suspense fallback={null}>
          <DoneSheet
            title={block.title}
            busy={acts.busy}
            problem={problem}
            onClose={() => setEnding(false)}
            onEnd={(minutesLeft) =>
              acts.end(
                workId,
                stint.id,
                minutesLeft,
                said(minutesLeft > 0 ? `The rest of ${block.title} is open again.` : `${block.title} is done.`),
              )
            }
          />
        </Suspense>
      ) : null}
    </>
  );
}
