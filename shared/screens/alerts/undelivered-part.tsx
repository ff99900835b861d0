import { sentenceOf } from '@/shared/client/api-problem';
import { useDecideUndelivered, useUndelivered } from '@/shared/client/alert-settings';
import { useCan } from '@/shared/client/session';
import { UndeliveredList } from '@/shared/ui/alerts/undelivered-list';
import { ProblemLine } from '@/shared/ui/auth/problem-line';

/** What could not be brought to somebody, for the manager; nothing where everything was. */
export function UndeliveredPart({ now, offline }: { now: number; offline: boolean }) {
  const may = useCan('workshop:write');
  const undelivered = useUndelivered(may);
  const decide = useDecideUndelivered();
  if (!may) return null;
  if (!undelivered.data)
    return undelivered.error ? (
      <ProblemLine text={`What could not be brought is not known. ${sentenceOf(undelivered.error)}`} />
    ) : null;
  if (undelivered.data.length === 0) return null;
  return (
    <UndeliveredList
      entries={undelivered.data}
      now={now}
      busyId={decide.isPending ? decide.variables.id : null}
      offline={offline}
      problem={decide.error ? sentenceOf(decide.error) : null}
      onDecide={(id, what) => decide.mutate({ id, what })}
    />
  );
}
