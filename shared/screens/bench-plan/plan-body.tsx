import { lazy, Suspense, useEffect, useMemo, useRef, useState } from 'react';
import { View } from 'react-native';
import type { BenchPlanDto } from '@/shared/contract/bench-plan';
import { fitsPartId } from '@/shared/ui/bench-plan/fits-part';
import { PlanList } from '@/shared/ui/bench-plan/plan-list';
import { PlanPicture } from '@/shared/ui/bench-plan/plan-picture';
import { StatusRegion } from '@/shared/ui/primitives/live-region';
import { Txt } from '@/shared/ui/primitives/txt';
import { makeStyles } from '@/shared/ui/theme/make-styles';
import { widths } from '@/shared/ui/theme/tokens';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { PlanMove } from './plan-move';
import { PlanSide, UrgentParts } from './plan-side';
import type { Acts } from './use-acts';
import type { Move } from './use-move';

const WeekPicture = lazy(() =>
  import('@/shared/ui/bench-plan/week-picture').then((part) => ({ default: part.WeekPicture })),
);
const WeekList = lazy(() => import('@/shared/ui/bench-plan/week-list').then((part) => ({ default: part.WeekList })));

/** The plan of the days shown, as the screen has room for it: time line and side column, or a list. */
export function PlanBody({
  plan,
  now,
  today,
  old,
  coming,
  acts,
  move,
  onDay,
  onGo,
}: {
  plan: BenchPlanDto;
  now: number;
  today: string;
  /** The link is down: what is shown is old. */
  old: boolean;
  /** Other days have been asked for and are not there yet. */
  coming: boolean;
  acts: Acts;
  move: Move;
  onDay: (day: string) => void;
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  const size = useBreakpoint();
  const [person, setPerson] = useState<string | null>(null);
  const asOf = Date.parse(plan.at);
  const at = useMemo(() => ({ now, asOf }), [now, asOf]);
  const picked = move.subject?.chargeId ?? null;
  const side = useRef<View>(null);
  useEffect(() => {
    // Picked in the lanes, its places stand at the head of the side column: seen without scrolling there.
    const element = side.current as unknown as Partial<HTMLElement> | null;
    if (picked !== null && size === 'wide') element?.scrollIntoView?.({ block: 'nearest' });
  }, [picked, size]);
  const sideProps = { plan, now, offline: old, acts, move, person, onPerson: setPerson, onGo };
  const free = (personId: string) => {
    setPerson(personId);
    document.getElementById(fitsPartId)?.scrollIntoView?.({ block: 'nearest' });
  };
  const nothing =
    plan.charges.length === 0 ? (
      <Txt tone="ink2">
        {plan.days === 1 ? 'Nothing is planned for this day.' : 'Nothing is planned for these days.'}
      </Txt>
    ) : null;
  const picture =
    plan.days === 7 ? (
      <Suspense fallback={<View style={styles.coming} />}>
        {size === 'phone' ? (
          <WeekList plan={plan} today={today} now={now} onDay={onDay} onGo={onGo} />
        ) : (
          <WeekPicture
            plan={plan}
            today={today}
            now={now}
            nameWidth={size === 'wide' ? 112 : 72}
            onDay={onDay}
            onGo={onGo}
          />
        )}
      </Suspense>
    ) : size === 'phone' ? (
      <PlanList plan={plan} at={at} stale={old} picked={picked} onPick={move.pick} onFree={free} />
    ) : (
      <PlanPicture
        plan={plan}
        at={at}
        stale={old}
        picked={picked}
        places={move.places}
        ghost={move.ghost}
        acts={{
          onPick: move.pick,
          onKey: move.key,
          onDrag: move.drag,
          onDrop: move.drop,
          onCancel: move.leave,
          onFree: free,
        }}
      />
    );
  const panel = <PlanMove move={move} sheet={size !== 'wide'} now={now} today={today} offline={old} onGo={onGo} />;
  const heard =
    move.heard ||
    (move.places && move.subject
      ? `Arrow keys move ${move.subject.title}, Enter takes it there, Escape leaves it.`
      : '');
  if (size !== 'wide')
    return (
      <View style={styles.stack}>
        <StatusRegion text={heard} />
        <UrgentParts {...sideProps} />
        {nothing}
        <View aria-busy={coming || undefined} style={coming && styles.dim}>
          {picture}
        </View>
        {panel}
        <View ref={side}>
          <PlanSide {...sideProps} />
        </View>
      </View>
    );
  return (
    <View style={styles.columns}>
      <StatusRegion text={heard} />
      <View style={[styles.work, coming && styles.dim]} aria-busy={coming || undefined}>
        {nothing}
        {picture}
      </View>
      <View ref={side} style={styles.side}>
        {panel}
        <UrgentParts {...sideProps} />
        <PlanSide {...sideProps} />
      </View>
    </View>
  );
}

const useStyles = makeStyles(() => ({
  stack: { rowGap: 16, paddingTop: 8, paddingBottom: 16 },
  columns: { flexDirection: 'row', alignItems: 'flex-start', columnGap: 24 },
  work: { flex: 1, minWidth: 0 },
  side: { width: widths.sideMin, flexShrink: 0, rowGap: 14 },
  dim: { opacity: 0.5 },
  coming: { minHeight: 240 },
}));
