import { ErrorState } from '../states/error-state';
import { Loading } from '../states/loading';

/** In place of a charge that is not there: gone, not read, or still on its way. */
export function ChargeMissing({
  gone,
  problem,
  busy,
  onRetry,
  onBack,
}: {
  /** The server knows no such charge. */
  gone: boolean;
  /** Why it could not be read; null: it is still loading. */
  problem: string | null;
  busy: boolean;
  onRetry: () => void;
  onBack: () => void;
}) {
  if (gone)
    return (
      <ErrorState
        failed="This charge is not here."
        toDo="It was dropped, or it belongs to another workshop."
        action={{ title: 'Back to the bench', onPress: onBack }}
      />
    );
  if (problem !== null)
    return (
      <ErrorState
        failed="The charge could not be read."
        safe="It goes on as it was set."
        toDo={problem}
        action={{ title: 'Try again', onPress: onRetry, busy }}
      />
    );
  return <Loading what="the charge" onRetry={onRetry} />;
}
