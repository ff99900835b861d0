import { useRouter, type Href } from 'expo-router';
import { useEffect, useRef } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useBenchPlan } from '@/shared/client/bench-plan';
import { useLink } from '@/shared/client/link';
import { useCan } from '@/shared/client/session';
import type { BenchChangeDto } from '@/shared/contract/bench-plan';
import { DayBar } from '@/shared/ui/bench-plan/day-bar';
import { Button } from '@/shared/ui/primitives/button';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading, WellBar } from '@/shared/ui/states/loading';
import { margin } from '@/shared/ui/theme/tokens';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { PlanBody } from './plan-body';
import { PlanHeader } from './plan-header';
import { useActs } from './use-acts';
import { useDays } from './use-days';
import { useMove } from './use-move';

/** Puts the focus back on a charge that a move has drawn anew in another lane. */
function useFocusAfterMove(plan: unknown): (chargeId: string) => void {
  const wanted = useRef<string | null>(null);
  useEffect(() => {
    if (wanted.current === null || typeof document === 'undefined') return;
    if (document.activeElement === null || document.activeElement === document.body)
      document.querySelector<HTMLElement>(`[data-charge="${CSS.escape(wanted.current)}"]`)?.focus();
    wanted.current = null;
  }, [plan]);
  return (chargeId) => void (wanted.current = chargeId);
}

/** The bench plan for those who plan the bench. */
export function BenchPlanPage() {
  const router = useRouter();
  const days = useDays();
  const wide = useBreakpoint() === 'wide';
  const query = useBenchPlan(days.asked, days.days);
  const old = useLink().state === 'down';
  const enters = useCan('equipment:write');
  const plan = query.data;
  const renew = () => void query.refetch();
  const acts = useActs(renew);
  const focusLater = useFocusAfterMove(plan);
  const moved = (change: BenchChangeDto, chargeId: string) => {
    focusLater(chargeId);
    acts.done(change);
  };
  const move = useMove(plan, days.now, moved, renew);
  const go = (path: string) => router.push(path as Href);
  const planOne = () => go('/plan');
  return (
    <Screen
      header={<PlanHeader plan={plan} days={days} onPlan={planOne} />}
      foot={
        wide || !plan ? undefined : (
          <View style={{ paddingHorizontal: margin.phone, paddingVertical: 10 }}>
            <Button title="Plan a charge" icon="plan" onPress={planOne} />
          </View>
        )
      }
    >
      {wide ? null : <DayBar day={days.day} days={days.days} today={days.today} onChange={days.show} />}
      {plan ? (
        plan.channels.length === 0 ? (
          <Empty
            sentence="No channels yet. A charger brings them."
            action={
              enters
                ? { title: 'Enter a charger', icon: 'plus', onPress: () => go('/workshop/chargers/new') }
                : { title: 'See the chargers', onPress: () => go('/workshop?section=chargers') }
            }
          />
        ) : (
          <PlanBody
            plan={plan}
            now={days.now}
            today={days.today}
            old={old}
            coming={query.isPlaceholderData}
            acts={acts}
            move={move}
            onDay={(day) => days.show(day, 1)}
            onGo={go}
          />
        )
      ) : query.isError ? (
        <ErrorState
          failed="The bench plan could not be read."
          safe="The charges go on as they were set, and nothing of the plan is lost."
          toDo={sentenceOf(query.error)}
          action={{ title: 'Try again', onPress: renew, busy: query.isFetching }}
        />
      ) : (
        <Loading what="the bench plan" onRetry={renew}>
          <PlanFrame />
        </Loading>
      )}
    </Screen>
  );
}

/** The frame of the time line while it comes. */
const PlanFrame = () => (
  <View style={{ rowGap: 34, paddingTop: 24 }}>
    {[62, 40, 55, 70, 34, 48].map((width, row) => (
      <View key={row} style={{ flexDirection: 'row', columnGap: 40, alignItems: 'center' }}>
        <WellBar width={56} height={30} />
        <WellBar width={`${width}%`} height={38} />
      </View>
    ))}
  </View>
);
