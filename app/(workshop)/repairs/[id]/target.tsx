import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { sentenceOf } from '@/shared/client/api-problem';
import { useGate } from '@/shared/client/gate';
import { useRepair } from '@/shared/client/repairs';
import { TakeTarget } from '@/shared/screens/pack-reading/take-target';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Takes the target that the spare is charged to. */
export default function Target() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const repair = useRepair(id);
  const gate = useGate('repair:write');
  const page = `/repairs/${id}`;
  const go = (to: string) => router.replace(to as Href);
  const back = () => (router.canGoBack() ? router.back() : go(page));
  const read = () => go(`${page}/reading`);
  if (gate.may && repair.data?.computed)
    return (
      <TakeTarget
        key={id}
        repair={repair.data}
        computed={repair.data.computed}
        onBack={back}
        onRead={read}
        onTaken={() => go(page)}
      />
    );
  return (
    <Screen
      single
      header={
        <HeaderBar
          title="Target"
          sub={repair.data ? `${repair.data.number} · ${repair.data.vehicle}` : undefined}
          onBack={back}
        />
      }
    >
      {!gate.may ? (
        <Forbidden what="Targets are taken" roles={gate.roles} people={gate.people} />
      ) : repair.data ? (
        <Empty
          sentence="No target yet: no reading with healthy groups is there."
          action={{ title: 'Enter the group voltages', onPress: read }}
        />
      ) : repair.isError ? (
        <ErrorState
          failed="The repair could not be read."
          toDo={sentenceOf(repair.error)}
          action={{ title: 'Try again', onPress: () => void repair.refetch(), busy: repair.isFetching }}
        />
      ) : (
        <Loading what="the repair" onRetry={() => void repair.refetch()} />
      )}
    </Screen>
  );
}
