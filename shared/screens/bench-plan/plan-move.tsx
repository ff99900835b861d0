import { lazy, Suspense } from 'react';
import { View } from 'react-native';
import { useFormats } from '@/shared/ui/format/formats';
import { placeWords } from '@/shared/ui/bench-plan/charge-words';
import { makeStyles } from '@/shared/ui/theme/make-styles';
import type { Move } from './use-move';

const MovePanel = lazy(() => import('@/shared/ui/bench-plan/move-panel').then((part) => ({ default: part.MovePanel })));
const MoveSheet = lazy(() => import('@/shared/ui/bench-plan/move-panel').then((part) => ({ default: part.MoveSheet })));

/** The picked charge with its places: in the side column of the desk, in a sheet elsewhere. */
export function PlanMove({
  move,
  sheet,
  now,
  today,
  offline,
  onGo,
}: {
  move: Move;
  sheet: boolean;
  now: number;
  today: string;
  offline: boolean;
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  const formats = useFormats();
  const { subject } = move;
  if (!subject) return null;
  const Panel = sheet ? MoveSheet : MovePanel;
  const panel = (
    <Suspense fallback={<View style={!sheet && styles.coming} />}>
      <Panel
        title={subject.title}
        chargeId={subject.chargeId}
        stands={subject.channelNames.length === 0 ? null : placeWords(subject, now, formats)}
        dueAt={subject.dueAt}
        fixedBecause={subject.fixedBecause}
        places={move.places}
        placesProblem={move.placesProblem}
        candidate={move.candidate}
        placed={move.placed}
        other={move.other}
        taken={move.taken}
        typed={move.typed}
        timeError={move.timeError}
        today={today}
        now={now}
        busy={move.busy}
        offline={offline}
        problem={move.problem}
        onChannel={move.toChannel}
        onTyped={move.type}
        onStep={move.step}
        onRetry={move.retryPlaces}
        onMove={move.move}
        onLeave={move.leave}
        onGo={onGo}
      />
    </Suspense>
  );
  return sheet ? panel : <View style={styles.panel}>{panel}</View>;
}

const useStyles = makeStyles(({ colors }) => ({
  panel: { borderBottomWidth: 1.5, borderBottomColor: colors.edge, paddingBottom: 14 },
  coming: { minHeight: 200 },
}));
