import { useRouter, type Href } from 'expo-router';
import { lazy, Suspense } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useBoard } from '@/shared/client/board';
import { useChargers } from '@/shared/client/chargers';
import { useNow } from '@/shared/client/clock';
import { useLink } from '@/shared/client/link';
import { useModuleTypes } from '@/shared/client/module-types';
import { useCan, useMember } from '@/shared/client/session';
import { armSound, switchSound, useSoundState } from '@/shared/client/sound';
import { useSpares } from '@/shared/client/spares';
import { useWorkshop } from '@/shared/client/workshop';
import { BenchFits } from '@/shared/screens/work/bench-fits';
import { FillCard } from '@/shared/screens/work/fill-card';
import { useMyFills } from '@/shared/screens/work/use-my-fills';
import { SoundTool } from '@/shared/ui/alerts/sound-tool';
import { BenchList } from '@/shared/ui/bench/bench-list';
import { needsOf } from '@/shared/ui/bench/plan-needs';
import { firstName } from '@/shared/ui/charge/card-model';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { margin } from '@/shared/ui/theme/tokens';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';

// Only for a bench with nothing on it.
const FirstPlan = lazy(() => import('@/shared/ui/bench/first-plan').then((part) => ({ default: part.FirstPlan })));

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** All charges of the workshop, what needs somebody first. */
export default function Bench() {
  const router = useRouter();
  const { person, workshop } = useMember();
  const { zone, marks } = useFormats();
  const now = useNow(1000);
  const board = useBoard();
  const settings = useWorkshop().data;
  const sound = useSoundState();
  const wide = useBreakpoint() === 'wide';
  const old = useLink().state === 'down';
  const go = (path: string) => router.push(path as Href);
  const plan = (
    <Button title="Plan a charge" icon="plan" onPress={() => go('/plan')} size={wide ? 'small' : 'normal'} />
  );
  const charges = board.data?.charges ?? null;
  const mine = useMyFills(now);
  const footWith = (fills: typeof mine.fills) => <BenchFits now={now} later={fills} onGo={go} onStale={mine.renew} />;
  const some = charges !== null && charges.length > 0;
  return (
    <Screen
      header={
        <HeaderBar
          title="Bench"
          sub={`${firstName(person.name)} · ${workshop.name}`}
          clock={clock(now, zone, marks)}
          tools={<SoundTool state={sound} onArm={() => void armSound()} onSwitch={switchSound} />}
          action={some ? plan : undefined}
        />
      }
      foot={
        some && !wide ? <View style={{ paddingHorizontal: margin.phone, paddingVertical: 10 }}>{plan}</View> : undefined
      }
    >
      {some && board.data ? (
        <BenchList
          charges={charges}
          at={{ now, asOf: Date.parse(board.data.at) }}
          lagLimitVolts={settings === undefined ? undefined : settings.lagLimitMillivolts / 1000}
          old={old}
          docks={mine.fills.map(({ chargeId, from, to, title, stint }) => ({
            key: stint?.id ?? from,
            chargeId,
            from: Date.parse(from),
            to: Date.parse(to),
            title,
          }))}
          next={
            mine.now.length > 0 ? (
              <View style={{ rowGap: 8, paddingTop: 12 }}>
                {mine.now.map((fill) => (
                  <FillCard key={fill.stint?.id} block={fill} now={now} onGo={go} onStale={mine.renew} />
                ))}
              </View>
            ) : undefined
          }
          foot={footWith(mine.later)}
          onGo={go}
        />
      ) : charges ? (
        <>
          <EmptyBench onGo={go} />
          {footWith(mine.fills)}
        </>
      ) : board.isError ? (
        <ErrorState
          failed="The bench could not be read."
          safe="The charges go on as they were set."
          toDo={sentenceOf(board.error)}
          action={{ title: 'Try again', onPress: () => void board.refetch(), busy: board.isFetching }}
        />
      ) : (
        <Loading what="the bench" onRetry={() => void board.refetch()} />
      )}
    </Screen>
  );
}

/** The first day, or all is fitted: the one action, and what is still missing for it. */
function EmptyBench({ onGo }: { onGo: (path: string) => void }) {
  const chargers = useChargers().data;
  const types = useModuleTypes().data;
  const spares = useSpares().data;
  const needs = needsOf(
    { chargers, types, spares },
    { equipment: useCan('equipment:write'), stock: useCan('stock:write') },
  );
  const complete = needs?.every((need) => need.done) ?? false;
  return (
    <Empty
      sentence="No charges. Plan one from a spare on the shelf."
      action={{ title: 'Plan a charge', icon: 'plan', onPress: () => onGo('/plan') }}
    >
      <Suspense fallback={null}>
        <FirstPlan needs={complete ? null : needs} onGo={onGo} />
      </Suspense>
    </Empty>
  );
}
