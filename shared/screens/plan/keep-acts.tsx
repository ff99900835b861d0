import { sentenceOf } from '@/shared/client/api-problem';
import { wrongSentence } from '@/shared/client/forms';
import { useLink } from '@/shared/client/link';
import { moment } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { PlanActs } from '@/shared/ui/plan/plan-foot';
import type { Keep } from './use-keep';
import type { PlanPage } from './use-plan-page';

/** The two ways to keep a plan, and why it was not kept or cannot be. */
export function KeepActs({ page, keep }: { page: PlanPage; keep: Keep }) {
  const { request, chosen, plan, wrong, now } = page;
  const { zone, marks } = useFormats();
  const offline = useLink().state === 'down';
  return (
    <PlanActs
      holder={keep.holder}
      problem={keep.error ? sentenceOf(keep.error) : wrong > 0 ? wrongSentence(wrong) : null}
      note={
        offline
          ? 'No connection: a plan is kept when it is back.'
          : request !== null && chosen === null && !plan.isFetching
            ? 'There is no way to keep yet.'
            : null
      }
      disabled={offline || (request !== null && chosen === null)}
      busy={keep.busy}
      later={
        request?.clipOnAt ? `Queue it for ${moment(Date.parse(request.clipOnAt), zone, now, marks)}` : 'Keep for later'
      }
      onChecks={() => keep.send('checks')}
      onLater={() => keep.send('later')}
    />
  );
}
