import { useLink } from '@/shared/client/link';
import { newStint, useWorkActs } from '@/shared/client/work-acts';
import type { PersonFitsDto } from '@/shared/contract/bench-plan';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { EN_DASH } from '@/shared/ui/format/marks';
import { useToast } from '@/shared/ui/primitives/toast';
import { FitRows } from '@/shared/ui/work/fit-rows';

/** What fits one's own free stretch: taken in one tap, given back in one. */
export function FitList({
  stretch,
  now,
  most,
  onStale,
}: {
  stretch: PersonFitsDto['stretches'][number];
  now: number;
  most: { fitting: number; beside: number };
  /** After a refusal: ask again what fits. */
  onStale: () => void;
}) {
  const toast = useToast();
  const { zone, marks } = useFormats();
  const offline = useLink().state === 'down';
  const acts = useWorkActs(onStale);
  return (
    <FitRows
      stretch={stretch}
      fits={stretch.fits}
      now={now}
      most={most}
      busyWith={acts.busyWith}
      offline={offline}
      problem={acts.refused}
      onTake={({ work }, { from, minutes }) =>
        acts.take(
          work.id,
          {
            from: new Date(from).toISOString(),
            ...(work.splittable && minutes < work.leftLongMinutes ? { minutes } : {}),
          },
          (after) => {
            const stint = newStint(work, after);
            if (!stint) return;
            const at = (instant: string) => clock(Date.parse(instant), zone, marks);
            toast({
              text: `${work.title} is yours, ${at(stint.from)}${EN_DASH}${at(stint.to)}.`,
              action: { title: 'Give it back', onPress: () => acts.giveBack(work.id, stint.id) },
            });
          },
        )
      }
    />
  );
}
